import type { TiffDirectory } from './directory.js';

/** The keys of OGC 19-008r4 that a vertical grid needs. */
export interface GeoKeys {
  /** 1 projected, 2 geographic, 3 geocentric */
  readonly modelType: number | null;
  /** 1 pixel is area, 2 pixel is point */
  readonly rasterType: number | null;
  /** EPSG codes */
  readonly geodeticCrs: number | null;
  readonly verticalCrs: number | null;
  readonly angularUnit: number | null;
}

const GEO_KEY_DIRECTORY = 34735;
const USER_DEFINED = 32767;

/** The short-valued keys of an image's GeoKeyDirectory. */
export function readGeoKeys(image: TiffDirectory): GeoKeys {
  const directory = image.numbers(GEO_KEY_DIRECTORY) ?? [];
  const keys = new Map<number, number>();
  // a head of four numbers, then four per key: id, where the value stands (0: here), count, value
  for (let i = 4; i + 3 < directory.length; i += 4)
    if (directory[i + 1] === 0) keys.set(directory[i]!, directory[i + 3]!);
  const key = (id: number) => {
    const value = keys.get(id);
    return value === undefined || value === 0 || value === USER_DEFINED ? null : value;
  };
  return {
    modelType: key(1024),
    rasterType: key(1025),
    geodeticCrs: key(2048),
    verticalCrs: key(4096),
    angularUnit: key(2054),
  };
}
