import { formatLength, radToDeg } from '../../quantity/index.js';
import type { Campaign } from '../campaign.js';
import type { Warning } from '../fault.js';
import { quoted } from '../json-text.js';
import { heightIsOfPosition, readSitePosition } from '../places.js';

/** What was put in for something that the file leaves open and that enters a result. */
export function assumptions(campaign: Campaign): Warning[] {
  return [...convertedPositions(campaign), ...geodesicFibres(campaign), ...linesWithoutSource(campaign)];
}

/** What became of a position in another system, and what is doubtful about it. */
const convertedPositions = ({ sites }: Campaign): Warning[] =>
  sites.flatMap((site) => {
    if (site.position === undefined) return [];
    const path = `sites.${site.id}.position`;
    const read = readSitePosition(site.position);
    if (!read.ok) return [];
    const { latitudeRad, longitudeRad, heightM, steps, cautions } = read.position;
    const place = `${radToDeg(latitudeRad).toFixed(7)}°, ${radToDeg(longitudeRad).toFixed(7)}°`;
    const height =
      heightM === null
        ? ''
        : heightIsOfPosition(site)
          ? `; h = ${heightM.toFixed(4)} m out of it is taken as exact and tide-free: state h of the site with its uncertainty and tide system`
          : `; the h out of it, ${heightM.toFixed(4)} m, is not used, for the site states its own`;
    return [
      { code: 'position-converted', path, message: `${steps}: ${place}${height}.` },
      ...cautions.map(({ code, message }) => ({ code, path, message })),
    ];
  });

const geodesicFibres = ({ links }: Campaign): Warning[] =>
  links.flatMap(({ id, fibre }) =>
    fibre?.lengthIsGeodesic
      ? [
          {
            code: 'link-length-default',
            path: `links.${id}.length`,
            message: `no length stated; the geodesic between the sites, ${formatLength(fibre.lengthM)}, is used for the noise of the fibre. Installed fibre is longer, and the noise grows as length^(3/2).`,
          },
        ]
      : [],
  );

/** Two lines with a systematic error but no source: whether it is the same error changes what they are together. */
function linesWithoutSource({ sites }: Campaign): Warning[] {
  const paths = sites.flatMap(({ id, determinations }) =>
    determinations.flatMap((d, n) =>
      d.kind === 'levelled-from' &&
      d.k !== undefined &&
      d.k.value > 0 &&
      d.k.source === undefined &&
      d.dH.source === undefined
        ? [`sites.${id}.determinations.${n}.k`]
        : [],
    ),
  );
  const [first, ...more] = paths;
  if (first === undefined || more.length === 0) return [];
  return [
    {
      code: 'levelling-k-source',
      path: first,
      message: `k names no source, nor does it in ${more.length === 1 ? more[0] : `${more.length} other lines`}: the systematic errors of these lines are taken as independent. Lines of the same rods and method share theirs: {"value": "…", "source": ${quoted('rods')}}.`,
    },
  ];
}
