import type { WhatIfChange } from '../../lib/answers/what-if.js';
import { readAmount, readCorrelation, readCorrelationLength } from '../../lib/answers/what-if-text.js';
import type { QuantityKind, QuantityProblem, Read } from '../../lib/quantity/index.js';

/** What a control changes. */
export type EditTarget =
  | { readonly kind: 'part'; readonly input: string; readonly source: string | null; readonly measures: QuantityKind }
  /** `measures` null: inputs of the source have different units, only a factor makes sense */
  | { readonly kind: 'source'; readonly source: string; readonly measures: QuantityKind | null }
  | { readonly kind: 'correlation'; readonly source: string }
  | { readonly kind: 'correlation-length'; readonly source: string };

/** What a reader has set or typed; the campaign stays as it is. */
export interface Edit {
  readonly target: EditTarget;
  /** as typed; null: set by a factor */
  readonly text: string | null;
  readonly factor: number | null;
  /** null: what was typed cannot be read */
  readonly change: WhatIfChange | null;
  readonly problem: QuantityProblem | null;
}

export type Edits = ReadonlyMap<string, Edit>;

export const keyOf = (target: EditTarget): string =>
  target.kind === 'part' ? `part ${target.source ?? ''} ${target.input}` : `${target.kind} ${target.source}`;

/** Sets a factor; 1 puts the stated value back. */
export function withFactor(edits: Edits, target: EditTarget, factor: number): Edits {
  if (factor === 1 || (target.kind !== 'part' && target.kind !== 'source')) return without(edits, keyOf(target));
  const amount = { factor };
  const change: WhatIfChange =
    target.kind === 'part'
      ? { kind: 'part', input: target.input, source: target.source, amount }
      : { kind: 'source', source: target.source, amount };
  return added(edits, { target, text: null, factor, change, problem: null });
}

/** Types a value over; the stated text, or nothing at all, puts it back. */
export function withText(edits: Edits, target: EditTarget, text: string, stated: string): Edits {
  if (text.trim() === '' || text === stated) return without(edits, keyOf(target));
  const read = readChange(target, text);
  return added(
    edits,
    read.ok
      ? { target, text, factor: null, change: read.value, problem: null }
      : { target, text, factor: null, change: null, problem: read.problems[0] ?? null },
  );
}

export const without = (edits: Edits, key: string): Edits => new Map([...edits].filter(([one]) => one !== key));

/** A map keeps the order in which things were first changed. */
const added = (edits: Edits, edit: Edit): Edits => new Map(edits).set(keyOf(edit.target), edit);

function readChange(target: EditTarget, text: string): Read<WhatIfChange> {
  switch (target.kind) {
    case 'part': {
      const { kind, input, source } = target;
      return mapped(readAmount(text, target.measures), (amount) => ({ kind, input, source, amount }));
    }
    case 'source': {
      const { kind, source } = target;
      return mapped(readAmount(text, target.measures), (amount) => ({ kind, source, amount }));
    }
    case 'correlation': {
      const { kind, source } = target;
      return mapped(readCorrelation(text), (correlation) => ({ kind, source, correlation }));
    }
    case 'correlation-length': {
      const { kind, source } = target;
      return mapped(readCorrelationLength(text), (lengthM) => ({ kind, source, lengthM }));
    }
  }
}

const mapped = <A, B>(read: Read<A>, make: (value: A) => B): Read<B> =>
  read.ok ? { ok: true, value: make(read.value) } : read;

/** The changes that can be computed, in the order in which they were made. */
export const changesOf = (edits: Edits): WhatIfChange[] =>
  [...edits.values()].flatMap(({ change }) => (change ? [change] : []));
