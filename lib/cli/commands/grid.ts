import { grid as gridAnswer } from '../../answers/grid.js';
import { parseAngle, QuantityError } from '../../quantity/index.js';
import { gridReport } from '../../report/grid-report.js';
import { type Command, UsageError } from '../command.js';
import { withFileSource } from '../file-source.js';

/** `52.2961,10.4598` or `52°17'46"N, 10°27'35"E`. */
function readPlace(text: string): { latitudeDeg: number; longitudeDeg: number } {
  const [lat, lon, ...more] = text.split(',').map((part) => part.trim());
  if (!lat || !lon || more.length > 0)
    throw new UsageError(
      `grid: --at takes latitude and longitude with one comma between them, such as 52.2961,10.4598; found ${JSON.stringify(text)}`,
    );
  const angle = (part: string, axis: 'latitude' | 'longitude') => {
    try {
      return parseAngle(part, axis).degrees;
    } catch (error) {
      if (error instanceof QuantityError)
        throw new UsageError(`grid: --at: ${JSON.stringify(part)} is no ${axis}; expected ${error.expected}`);
      throw error;
    }
  };
  return { latitudeDeg: angle(lat, 'latitude'), longitudeDeg: angle(lon, 'longitude') };
}

export const grid: Command = {
  name: 'grid',
  summary: 'the value of a geoid or quasigeoid grid at a place, and what was understood of the file',
  synopsis: 'FILE --at LAT,LON [--method bilinear|bicubic] [--json | --csv | --markdown]',
  takesFile: 'data',
  description: [
    'Reads a grid of geoid heights or height anomalies: ISG (1.0, 1.01, 2.0), GTX or GeoTIFF, told by its content. Shows the header as it was understood, the nodes used and the value.',
    'Whether the bounds of a file are nodes or edges of cells is worked out both ways and accepted only where it fits. Nothing is extrapolated and no missing value filled in. The whole file is looked through for what no geoid can be.',
  ],
  options: {
    at: { value: 'LAT,LON', help: 'the place in degrees, north and east positive: 52.2961,10.4598' },
    method: { value: 'METHOD', help: 'bilinear (default) or bicubic: cubic convolution with a = −1/2' },
  },
  examples: [
    'plumbtick grid quasigeoid.isg --at 52.2961,10.4598',
    'plumbtick grid geoid.tif --at "33°54\'S, 151°12\'E" --method bicubic --json',
  ],
  async run(call) {
    const at = call.option('at');
    if (at === null) throw new UsageError('grid needs a place: --at LAT,LON, such as --at 52.2961,10.4598');
    const place = readPlace(at);
    const method = call.option('method') ?? 'bilinear';
    if (method !== 'bilinear' && method !== 'bicubic')
      throw new UsageError(`grid: --method is bilinear or bicubic; found ${JSON.stringify(method)}`);
    if (call.fileName === null || call.fileName === '-')
      throw new UsageError('grid reads stretches of a file, which standard input does not allow: name the file');
    const answer = await withFileSource(call.fileName, (source) => gridAnswer(source, { ...place, method }));
    return { kind: 'answer', status: 0, json: answer, report: () => gridReport(answer, call.provenance) };
  },
};
