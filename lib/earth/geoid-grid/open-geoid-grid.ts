import { CampaignError } from '../../campaign/fault.js';
import type { ByteSource } from '../file-bytes/byte-source.js';
import type { GeoidGrid } from './geoid-grid.js';
import { readGeoTiff } from './geotiff.js';
import { looksLikeGtx, readGtx } from './gtx.js';
import { readIsg } from './isg.js';
import { looksLikeTiff } from './tiff/directory.js';

const SNIFF_BYTES = 2 ** 16;

/** Opens a geoid or quasigeoid grid, told by its content and not by its name: ISG 1.0, 1.01 and 2.0, GTX, GeoTIFF.
 * @throws {CampaignError} `not-a-grid`, or what is wrong in the file */
export async function openGeoidGrid(source: ByteSource): Promise<GeoidGrid> {
  const start = await source.read(0, SNIFF_BYTES);
  if (looksLikeTiff(start)) return readGeoTiff(source);
  if (isText(start)) return readIsg(source);
  if (looksLikeGtx(start)) return readGtx(source);
  throw new CampaignError([
    {
      code: 'not-a-grid',
      path: '',
      line: null,
      column: null,
      found:
        start.length === 0 ? 'an empty file' : `${source.size} bytes that are neither text nor a TIFF nor a GTX head`,
      expected: 'a geoid or quasigeoid grid: ISG (text), GTX or GeoTIFF',
    },
  ]);
}

/** Text has no control characters but tabs, line ends and form feeds in its first stretch. */
function isText(bytes: Uint8Array): boolean {
  if (bytes.length === 0) return false;
  return bytes.every((b) => b >= 0x20 || (b >= 0x09 && b <= 0x0d));
}
