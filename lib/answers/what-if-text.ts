import { CampaignError, faultAt } from '../campaign/fault.js';
import type { Model } from '../model/model.js';
import { closest, type QuantityKind, type Read, readExact, readStandardUncertainty } from '../quantity/index.js';
import type { Amount, WhatIfChange } from './what-if.js';

const KIND_OF_KEY: Readonly<Record<string, QuantityKind>> = {
  h: 'length',
  zeta: 'length',
  N: 'length',
  H: 'length',
  dH: 'length',
  g: 'acceleration',
  gammaRef: 'acceleration',
  W: 'potential',
  W0: 'potential',
  C: 'potential',
  variable: 'potential',
  commission: 'potential',
  omission: 'potential',
  gradient: 'gradient',
  meanGravityFactor: 'gradient',
  b: 'root-length',
  k: 'length-ratio',
};

/** What an input measures, by its path: fixes the units in which its u can be typed. */
export const kindOfInput = (path: string): QuantityKind => KIND_OF_KEY[path.split('.').at(-1)!] ?? 'fraction';

/** What all inputs of a source measure; null where they differ, or none names it. */
export function kindOfSource({ inputs }: Model, source: string): QuantityKind | null {
  const kinds = new Set(
    inputs.flatMap(({ path, parts }) => (parts.some((p) => p.source === source) ? [kindOfInput(path)] : [])),
  );
  return kinds.size === 1 ? [...kinds][0]! : null;
}

/** An amount as typed: a standard uncertainty with its unit, `1 cm`, or a factor, `×0.5` (also `x0.5`, `*0.5`).
 * @param kind what is measured; null: only a factor makes sense */
export function readAmount(text: string, kind: QuantityKind | null): Read<Amount> {
  const factor = /^\s*[×x*]\s*(.*)$/su.exec(text);
  if (factor) {
    const read = readStandardUncertainty(factor[1]!, 'fraction');
    return read.ok ? { ok: true, value: { factor: read.value } } : read;
  }
  if (kind === null)
    return {
      ok: false,
      problems: [
        {
          code: 'wrong-type',
          at: '',
          position: null,
          found: JSON.stringify(text),
          expected: 'a factor such as ×0.5: the inputs of the source have different units',
        },
      ],
    };
  const read = readStandardUncertainty(text, kind);
  return read.ok ? { ok: true, value: { u: read.value } } : read;
}

/** A correlation between different sites as typed, −1…1. */
export function readCorrelation(text: string): Read<number> {
  const read = readExact(text, 'fraction');
  return !read.ok || Math.abs(read.value) <= 1
    ? read
    : {
        ok: false,
        problems: [{ code: 'out-of-range', at: '', position: null, found: text, expected: 'from \u22121 to 1' }],
      };
}

/** A correlation length as typed, above 0, SI. */
export function readCorrelationLength(text: string): Read<number> {
  const read = readExact(text, 'length');
  return !read.ok || read.value > 0
    ? read
    : {
        ok: false,
        problems: [{ code: 'out-of-range', at: '', position: null, found: text, expected: 'a length above 0' }],
      };
}

/** One change in a line: `sites.ridge.g = 5 mGal`, `clocks.r1.tie.0.dH = ×0.5`, `sources.geoid = 1 cm`,
 *  `sources.gnss.correlation = 0.9`, `sources.geoid.correlationLength = 30 km`; `sites.a.determinations.0.zeta@geoid = 1 cm` for the
 *  part of one source where an input has several.
 * @throws {CampaignError} what cannot be read, or names nothing of the campaign */
export function readWhatIf(text: string, model: Model): WhatIfChange[] {
  const at = text.indexOf('=');
  const [left, right] = at < 0 ? [text.trim(), ''] : [text.slice(0, at).trim(), text.slice(at + 1).trim()];
  const refuse = (code: string, found: string, expected: string): never => {
    throw new CampaignError([faultAt(code, left, found, expected)]);
  };
  if (at < 0) refuse('missing', text, 'PATH = AMOUNT, such as sites.ridge.g = 5 mGal or sources.geoid = ×0.5');
  const value = <T>(read: Read<T>): T => {
    if (read.ok) return read.value;
    const [problem] = read.problems;
    return refuse(problem!.code, problem!.found, problem!.expected);
  };
  const source = /^sources\.(.+?)(?:\.(correlation|correlationLength))?$/u.exec(left);
  if (source) {
    const [, id = '', key] = source;
    const ids = model.covariance.sources.map((s) => s.id);
    if (!ids.includes(id)) {
      const near = closest(id, ids);
      refuse('unknown-source', left, near === null ? `one of ${ids.join(', ')}` : `sources.${near}`);
    }
    if (key === 'correlation') return [{ kind: 'correlation', source: id, correlation: value(readCorrelation(right)) }];
    if (key === 'correlationLength')
      return [{ kind: 'correlation-length', source: id, lengthM: value(readCorrelationLength(right)) }];
    return [{ kind: 'source', source: id, amount: value(readAmount(right, kindOfSource(model, id))) }];
  }
  const [path = '', part] = left.split('@');
  const input = model.inputs.find((x) => x.path === path);
  if (!input) {
    const near = closest(
      path,
      model.inputs.map((x) => x.path),
    );
    return refuse('unknown-input', left, near === null ? 'the path of an input, as a budget names it' : near);
  }
  const amount = value(readAmount(right, kindOfInput(path)));
  const parts = [...new Set(input.parts.map((p) => p.source))];
  if (part !== undefined) {
    if (!parts.includes(part))
      refuse('unknown-source', left, `a source of it: ${parts.filter(Boolean).join(', ') || 'none'}`);
    return [{ kind: 'part', input: path, source: part, amount }];
  }
  if ('u' in amount && parts.length > 1)
    refuse(
      'several-parts',
      left,
      `one part: ${parts.map((p) => (p === null ? `a factor, or its own part alone by ${path}@` : `${path}@${p}`)).join(', ')}`,
    );
  return (parts.length === 0 ? [null] : parts).map((one) => ({ kind: 'part', input: path, source: one, amount }));
}
