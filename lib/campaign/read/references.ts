import { quoted } from '../json-text.js';
import type { source } from '../schema/campaign-schema.js';
import type { ListName, ReadOf } from '../schema/descriptor.js';
import { suggestion } from './keys.js';
import type { Reading, Use } from './reading.js';

const SINGULAR: Readonly<Record<ListName, string>> = {
  sources: 'source',
  datums: 'datum',
  transitions: 'transition',
  sites: 'site',
  clocks: 'clock',
  links: 'link',
  measurements: 'measurement',
};

/** Every name of another item has to name one, and not the item in which it stands. */
export function checkReferences(reading: Reading): void {
  for (const use of reading.uses) {
    const { list, id, node, builtIn, context } = use;
    const known = reading.definitions.get(list);
    if (!known?.has(id) && !builtIn.includes(id)) {
      if (reading.incomplete.has(list)) continue;
      const candidates = [...(known?.keys() ?? []), ...builtIn];
      const expected =
        candidates.length === 0
          ? `a ${SINGULAR[list]}: none stands in ${quoted(list)}`
          : `a ${SINGULAR[list]}: ${suggestion(id, candidates)}`;
      context.refuse(node, 'unknown-id', expected);
    } else if (context.owner?.list === list && context.owner.id === id)
      context.refuse(node, 'self-reference', `another ${SINGULAR[list]} than the one it stands in`);
  }
}

/** A correlation length needs a distance: sources that have one may be named only by what lies at a site. */
export function checkSources(sources: readonly Partial<ReadOf<typeof source>>[], uses: readonly Use[]): void {
  const withLength = new Set(sources.flatMap((s) => (s.correlationLength === undefined ? [] : [s.id])));
  for (const { list, id, node, context } of uses)
    if (list === 'sources' && !context.atSite && withLength.has(id))
      context.refuse(
        node,
        'correlation-length-off-site',
        'a source without correlationLength: this input lies at no site, so it has no distance to others',
      );
}
