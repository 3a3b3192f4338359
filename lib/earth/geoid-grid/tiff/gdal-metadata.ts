import type { TiffDirectory } from './directory.js';

/** What stands about one sample in the XML of tag 42112 (PROJ documentation, Geodetic TIFF grids). */
export interface SampleMetadata {
  readonly description?: string;
  readonly unit?: string;
  readonly scale?: number;
  readonly offset?: number;
}

export interface GdalMetadata {
  readonly type: string | null;
  readonly targetCrs: string | null;
  /** by number of the sample; holes where nothing is said */
  readonly samples: readonly (SampleMetadata | undefined)[];
}

const GDAL_METADATA = 42112;
const FIELDS: Readonly<Record<string, keyof SampleMetadata>> = {
  description: 'description',
  unittype: 'unit',
  scale: 'scale',
  offset: 'offset',
};

/** Reads `<Item name= sample= role=>value</Item>` elements; anything else in the text is passed over. */
export function readGdalMetadata(image: TiffDirectory): GdalMetadata {
  const xml = image.text(GDAL_METADATA) ?? '';
  const samples: (SampleMetadata | undefined)[] = [];
  const whole = new Map<string, string>();
  for (const [, attributes, content] of xml.matchAll(/<Item\s([^>]*)>([^<]*)<\/Item>/g)) {
    const attribute = (name: string) => new RegExp(`\\b${name}\\s*=\\s*"([^"]*)"`).exec(attributes!)?.[1];
    const value = unescapeXml(content!.trim());
    const field = FIELDS[attribute('role')?.toLowerCase() ?? ''];
    const sample = Number(attribute('sample') ?? Number.NaN);
    if (field && Number.isInteger(sample) && sample >= 0 && sample < 1000) {
      const number = field === 'scale' || field === 'offset';
      samples[sample] = { ...samples[sample], [field]: number ? Number(value) : value };
    } else if (attribute('sample') === undefined) whole.set(attribute('name') ?? '', value);
  }
  const code = whole.get('target_crs_epsg_code');
  return { type: whole.get('TYPE') ?? null, targetCrs: code === undefined ? null : `EPSG:${code}`, samples };
}

const unescapeXml = (text: string): string =>
  text.replace(
    /&(lt|gt|quot|apos|amp);/g,
    (_, name: string) => ({ lt: '<', gt: '>', quot: '"', apos: "'", amp: '&' })[name] ?? '',
  );
