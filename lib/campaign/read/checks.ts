import { RECOMMENDED_FREQUENCIES, recommendedFrequency } from '../../clocks/recommended-frequencies.js';
import { closest } from '../../quantity/index.js';
import { quoted } from '../json-text.js';
import type { JsonNode } from '../json-tree.js';
import type { campaignSchema, correlation, measurement, site, transition } from '../schema/campaign-schema.js';
import type { ReadOf } from '../schema/descriptor.js';
import type { Origin, Reading } from './reading.js';
import { checkReferences, checkSources } from './references.js';

/** What is left of an object when refused keys are missing from it. */
type Readable<T> = Partial<T>;

/** Checks across keys and items, on whatever could be read. */
export function checkCampaign(file: Readable<ReadOf<typeof campaignSchema>>, reading: Reading): void {
  checkReferences(reading);
  checkSources(file.sources ?? [], reading.uses);
  for (const s of file.sites ?? []) checkHeights(s, reading);
  for (const t of file.transitions ?? []) checkTransition(t, reading);
  for (const m of file.measurements ?? []) checkMeasurement(m, reading);
  checkCorrelations(file.correlations ?? [], reading);
}

const member = ({ node }: Origin, key: string): JsonNode =>
  (node.type === 'object' ? node.members.get(key)?.value : undefined) ?? node;

/** A GNSS height is the determination's own or the site's; nothing stands in for it. */
function checkHeights(s: Readable<ReadOf<typeof site>>, reading: Reading): void {
  if (member(reading.originOf(s), 'h') !== reading.originOf(s).node) return;
  for (const d of s.determinations ?? []) {
    if (d.kind !== 'gnss-quasigeoid' && d.kind !== 'gnss-geoid') continue;
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
