import { RECOMMENDED_FREQUENCIES, recommendedFrequency } from '../../clocks/recommended-frequencies.js';
import { closest } from '../../quantity/index.js';
import { quoted } from '../json-text.js';
import type { JsonNode } from '../json-tree.js';
import type { campaignSchema, correlation, measurement, site, transition } from '../schema/campaign-schema.js';
import type { ReadOf } from '../schema/descriptor.js';
import type { clock, link } from '../schema/instruments.js';
import { checkOceanLoading, checkPole, checkPosition, checkRoute, explainSwappedAxes } from './place-checks.js';
import type { Origin, Reading } from './reading.js';
import { checkReferences, checkSources } from './references.js';

/** What is left of an object when refused keys are missing from it. */
type Readable<T> = Partial<T>;

/** Checks across keys and items, on whatever could be read. */
export function checkCampaign(file: Readable<ReadOf<typeof campaignSchema>>, reading: Reading): void {
  checkReferences(reading);
  checkSources(file.sources ?? [], reading.uses);
  for (const s of file.sites ?? []) {
    checkHeights(s, reading);
    explainSwappedAxes(s, reading);
    checkPosition(s, reading);
    checkOceanLoading(s, reading);
    checkLines(s, reading);
  }
  for (const c of file.clocks ?? []) checkFlywheel(c, reading);
  for (const l of file.links ?? []) {
    checkLink(l, reading);
    if (l.route !== undefined) checkRoute(l.route, reading);
  }
  for (const t of file.transitions ?? []) checkTransition(t, reading);
  for (const m of file.measurements ?? []) checkMeasurement(m, reading);
  checkCorrelations(file.correlations ?? [], reading);
  checkPole(file.pole ?? [], reading);
}

const member = ({ node }: Origin, key: string): JsonNode =>
  (node.type === 'object' ? node.members.get(key)?.value : undefined) ?? node;

/** A GNSS height is the determination's own or the site's; nothing stands in for it. */
function checkHeights(s: Readable<ReadOf<typeof site>>, reading: Reading): void {
  // geocentric coordinates hold a height
  if (member(reading.originOf(s), 'h') !== reading.originOf(s).node || s.position?.z !== undefined) return;
  for (const d of s.determinations ?? []) {
    if (d.kind !== 'gnss-quasigeoid' && d.kind !== 'gnss-geoid' && d.kind !== 'gravity-model') continue;
    const { context, node } = reading.originOf(d);
    if (member({ context, node }, 'h') === node)
      reading.add(
        'missing-key',
        `${context.path}.h`,
        node,
        'nothing',
        '"h": the ellipsoidal height, here or at the site',
      );
  }
}

/** The uncertainty of a levelled dH is stated once: with the value, or by b and k of the line. */
function checkLines(s: Readable<ReadOf<typeof site>>, reading: Reading): void {
  for (const d of s.determinations ?? []) {
    if (d.kind !== 'levelled-from' || d.length === undefined || !(d.dH?.u > 0)) continue;
    if (d.b === undefined && d.k === undefined) continue;
    const origin = reading.originOf(d);
    const dH = member(origin, 'dH');
    reading.add(
      'u-twice',
      `${origin.context.path}.dH`,
      dH,
      reading.show(dH),
      'the uncertainty once: here, or by "b" and "k" of the line',
    );
  }
}

/** A flywheel bridges gaps: when the clock runs has to be known. */
function checkFlywheel(c: Readable<ReadOf<typeof clock>>, reading: Reading): void {
  if (c.flywheel === undefined) return;
  const { context, node } = reading.originOf(c.flywheel);
  if (c.available === undefined && c.flywheel.cycle === undefined)
    reading.add(
      'missing-key',
      `${context.path}.cycle`,
      node,
      'nothing',
      '"cycle": the clock runs for its uptime at the beginning of each; or "available" intervals of the clock. What a flywheel adds depends on where the gaps lie',
    );
  else if (c.available !== undefined && c.flywheel.cycle !== undefined)
    reading.add(
      'exclusive-keys',
      `${context.path}.cycle`,
      member({ context, node }, 'cycle'),
      '"cycle" and "available" of the clock',
      'one of them',
    );
}

function checkLink(l: Readable<ReadOf<typeof link>>, reading: Reading): void {
  if (l.fibre !== undefined && l.stability?.phase !== undefined) {
    const { context, node } = reading.originOf(l.stability);
    reading.add(
      'exclusive-keys',
      `${context.path}.phase`,
      member({ context, node }, 'phase'),
      '"phase" beside "fibre"',
      'the phase noise once: as measured, or from the noise of the fibre',
    );
  }
  const travels = l.transported?.clock;
  if (travels === undefined || l.from === undefined || l.to === undefined || travels === l.from || travels === l.to)
    return;
  const { context, node } = reading.originOf(l.transported!);
  const at = member({ context, node }, 'clock');
  reading.add(
    'not-one-of',
    `${context.path}.clock`,
    at,
    reading.show(at),
    `one end of the link: ${quoted(l.from)} or ${quoted(l.to)}`,
  );
}

function checkTransition(t: Readable<ReadOf<typeof transition>>, reading: Reading): void {
  if (t.id === undefined) return;
  const origin = reading.originOf(t);
  const stated = member(origin, 'frequency');
  if (recommendedFrequency(t.id) === null) {
    if (stated !== origin.node) return;
    const near = closest(
      t.id,
      RECOMMENDED_FREQUENCIES.map((f) => f.transition),
    );
    reading.add(
      'missing-key',
      `${origin.context.path}.frequency`,
      origin.node,
      'nothing',
      `"frequency" in Hz, for ${quoted(t.id)} has no recommended one${near === null ? '' : `; did you mean ${quoted(near)}?`}`,
    );
  } else if (stated !== origin.node)
    reading.add(
      'frequency-is-recommended',
      `${origin.context.path}.frequency`,
      stated,
      reading.show(stated),
      `no frequency: the recommended one of ${quoted(t.id)} is built in; a measured departure from it is "offset"`,
    );
}

function checkMeasurement(m: Readable<ReadOf<typeof measurement>>, reading: Reading): void {
  const origin = reading.originOf(m);
  if (m.tide !== undefined && m.y !== undefined && m.y.tide !== null)
    reading.add(
      'exclusive-keys',
      `${origin.context.path}.tide`,
      member(origin, 'tide'),
      '"tide" beside y and in it',
      'one of them',
    );
  if (m.includesSystematic === true && m.y?.u === 0) {
    const y = member(origin, 'y');
    reading.add(
      'uncertainty-missing',
      `${origin.context.path}.y`,
      y,
      reading.show(y),
      'a y with its uncertainty, which "includesSystematic" says is the whole one',
    );
  }
}

function checkCorrelations(correlations: readonly Readable<ReadOf<typeof correlation>>[], reading: Reading): void {
  const seen = new Map<string, string>();
  for (const c of correlations) {
    const [a, b] = c.between ?? [];
    if (a === undefined || b === undefined) continue;
    const origin = reading.originOf(c);
    const node = member(origin, 'between');
    const path = `${origin.context.path}.between`;
    if (a === b) reading.add('self-reference', path, node, `${quoted(a)} twice`, 'two measurements');
    const pair = JSON.stringify([a, b].sort());
    const first = seen.get(pair);
    if (first !== undefined)
      reading.add(
        'duplicate-pair',
        path,
        node,
        `${quoted(a)} and ${quoted(b)} again`,
        `each pair once: it stands at ${first}`,
      );
    else seen.set(pair, origin.context.path);
  }
}
