import { closest } from '../../quantity/index.js';
import type { Warning } from '../fault.js';
import { quoted } from '../json-text.js';
import type { campaignSchema } from '../schema/campaign-schema.js';
import type { ReadOf } from '../schema/descriptor.js';
import { LINK_KINDS } from '../schema/instruments.js';
import type { Use } from './reading.js';

/** What reads well and may still be a slip: a source that nothing names, a kind of link that is nearly a known one. */
export function doubts(file: ReadOf<typeof campaignSchema>, uses: readonly Use[]): Warning[] {
  const named = new Set(uses.flatMap(({ list, id }) => (list === 'sources' ? [id] : [])));
  const unused = (file.sources ?? []).flatMap(({ id }, i) =>
    named.has(id)
      ? []
      : [
          {
            code: 'unused-source',
            path: `sources.${i}`,
            message: `No input names the source ${quoted(id)}: it correlates nothing.`,
          },
        ],
  );
  const kinds = (file.links ?? []).flatMap(({ id, kind }) => {
    const near = kind === undefined ? null : closest(kind, LINK_KINDS);
    return near === null || near === kind
      ? []
      : [
          {
            code: 'link-kind',
            path: `links.${id}.kind`,
            message: `${quoted(kind as string)} is kept as a text of your own; did you mean ${quoted(near)}?`,
          },
        ];
  });
  return [...unused, ...kinds];
}
