// Cuts a window (50–54° N, 8–14° E) of the EGM96 15' grid that Debian's proj-data carries as GTX, and writes it with GDAL as GTX and as
// GeoTIFF in the packings that vertical grids use. Writes reference.json too: what PROJ's cct finds in the whole grid at points of the window.
// Run: node test/data/geotiff/make-windows.mjs   (needs proj-data, proj-bin, gdal-bin)
import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const here = path.dirname(fileURLToPath(import.meta.url));
const work = fs.mkdtempSync(path.join(os.tmpdir(), 'windows-'));
const grid = '/usr/share/proj/egm96_15.gtx';
const out = (name) => path.join(here, name);
const translate = (...words) => execFileSync('gdal_translate', ['-q', ...words], { stdio: ['ignore', 'ignore', 'inherit'] });

// edges of the cells round the nodes 50 … 54, 8 … 14
translate('-of', 'GTX', '-projwin', '7.875', '54.125', '14.125', '49.875', grid, out('egm96-window.gtx'));

// what each file says of itself, by way of a VRT
const vrt = path.join(work, 'window.vrt');
translate('-of', 'VRT', '-a_srs', 'EPSG:4326', out('egm96-window.gtx'), vrt);
const described = (name, description, unit, point) => {
  const file = path.join(work, `${name}.vrt`);
  let xml = fs.readFileSync(vrt, 'utf8').replace(/relativeToVRT="1">[^<]*</g, `relativeToVRT="0">${out('egm96-window.gtx')}<`);
  xml = xml.replace(/(<VRTRasterBand[^>]*>)/, `$1<Description>${description}</Description><UnitType>${unit}</UnitType>`);
  xml = xml.replace(
    /(<VRTDataset[^>]*>)/,
    `$1<Metadata><MDI key="TYPE">VERTICAL_OFFSET_GEOGRAPHIC_TO_VERTICAL</MDI><MDI key="AREA_OR_POINT">${point ? 'Point' : 'Area'}</MDI><MDI key="target_crs_epsg_code">5773</MDI></Metadata>`,
  );
  fs.writeFileSync(file, xml);
  return file;
};
const point = described('point', 'geoid_undulation', 'metre', true);
const area = described('area', 'geoid_undulation', 'metre', false);
const tiles = ['-co', 'TILED=YES', '-co', 'BLOCKXSIZE=16', '-co', 'BLOCKYSIZE=16'];

translate(...tiles, '-co', 'COMPRESS=DEFLATE', '-co', 'PREDICTOR=3', point, out('deflate-predictor3-tiles.tif'));
translate('-co', 'COMPRESS=LZW', '-co', 'PREDICTOR=3', '-co', 'BLOCKYSIZE=7', area, out('lzw-predictor3-strips.tif'));
// (predictor 3 and big-endian together come out wrong from this version of GDAL: it does not read back what it wrote)
translate('-co', 'COMPRESS=LZW', '-co', 'ENDIANNESS=BIG', area, out('lzw-big-endian.tif'));
translate('-ot', 'Int16', '-scale', '0', '100', '-10000', '10000', '-a_scale', '0.005', '-a_offset', '50', '-a_nodata', '-32768', '-co', 'COMPRESS=LZW', '-co', 'PREDICTOR=2', area, out('int16-scaled-lzw-predictor2.tif'));
translate('-ot', 'Int32', '-scale', '0', '100', '0', '1000000', '-a_scale', '0.0001', '-a_offset', '0', ...tiles, '-co', 'COMPRESS=DEFLATE', '-co', 'PREDICTOR=2', '-co', 'ENDIANNESS=BIG', point, out('int32-scaled-deflate-predictor2-big-endian.tif'));
translate('-ot', 'Float64', '-co', 'COMPRESS=DEFLATE', '-co', 'BIGTIFF=YES', point, out('float64-deflate-bigtiff.tif'));
translate('-co', 'BLOCKYSIZE=5', area, out('uncompressed-area.tif'));
translate('-a_nodata', '44.04656219482422', '-co', 'COMPRESS=DEFLATE', '-co', 'ZLEVEL=1', point, out('deflate-strips.tif'));
for (const name of fs.readdirSync(here)) if (name.endsWith('.aux.xml')) fs.rmSync(out(name));

const points = [
  [50, 8],
  [54, 14],
  [52.2961, 10.4598],
  [53.999, 8.001],
  [51.1234, 13.9],
  [50.0001, 11.25],
];
const answers = execFileSync('cct', ['-d', '9', '+proj=vgridshift', `+grids=${grid}`, '+multiplier=1'], {
  input: `${points.map(([lat, lon]) => `${lon} ${lat} 0 0`).join('\n')}\n`,
  encoding: 'utf8',
})
  .trim()
  .split('\n')
  .map((l, i) => ({ lat: points[i][0], lon: points[i][1], proj: Number(l.trim().split(/\s+/)[2]) }));
fs.writeFileSync(out('reference.json'), `${JSON.stringify({ points: answers }, null, 1)}\n`);
fs.rmSync(work, { recursive: true });
