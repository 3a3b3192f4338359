import { type FragmentState, type Packer, writeFragment } from '../../lib/campaign/fragment.js';

/** Packs by what the browser brings along; null where it brings nothing. */
const packer: Packer | null =
  typeof CompressionStream === 'undefined'
    ? null
    : async (bytes) => {
        const stream = new Blob([bytes as Uint8Array<ArrayBuffer>])
          .stream()
          .pipeThrough(new CompressionStream('deflate'));
        return new Uint8Array(await new Response(stream).arrayBuffer());
      };

/** The address of a page with a state behind its #.
 * @param page address without a fragment */
export const addressOf = async (page: string, state: FragmentState): Promise<string> =>
  `${page.split('#', 1)[0]}#${await writeFragment(state, packer)}`;
