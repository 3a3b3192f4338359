import type { Campaign, Datum, Determination, Measured, Site, TideSystem } from '../../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2, W0_IHRS, W0_TT } from '../../constants/defining-constants.js';
import { frameChangeOfHeight } from '../../earth/frames/height-in-frame.js';
import { GRS80 } from '../../earth/level-ellipsoid.js';
import { normalGravity } from '../../earth/normal-field.js';
import { BUILT_IN_W0_M2S2 } from '../../model/datums.js';
import { assumedTide } from '../../model/tide-labels.js';
import { degToRad, type Radians } from '../../quantity/radians.js';
import { exactly, type Mistake, withDetermination, withSite } from './mistake.js';

const TIDES: readonly TideSystem[] = ['mean', 'zero', 'free'];
const STANDARD_GRAVITY = 9.80665;
/** GM of current gravity models minus that of GRS80, m³/s²: 3.986004415e14 (IERS Conventions 2010, TT) − 3.986005e14. */
const GM_STEP = 3.986004415e14 - 3.986005e14;
/** GM step on a height anomaly is ΔGM/(r·γ): as a potential ΔGM/r, r the mean radius R₂ of GRS80 (Moritz 2000). */
const GM_POTENTIAL_STEP = GM_STEP / 6371007.181;

/** Mistakes in how a site's potential is stated, one at a time. */
export function heightMistakes(campaign: Campaign, sites: readonly Site[]): Mistake[] {
  return sites.flatMap((site) => [
    ...siteHeightMistakes(campaign, site),
    ...site.determinations.flatMap((d, n) =>
      d.check || d.candidate ? [] : determinationMistakes(campaign, site, d, n),
    ),
  ]);
}

/** What can be wrong with the site's own h and g, which several determinations may use. */
function siteHeightMistakes(campaign: Campaign, site: Site): Mistake[] {
  const path = `sites.${site.id}`;
  const found: Mistake[] = [];
  if (site.h) {
    const h = site.h;
    found.push(
      ...tideMistakes(h, 'ellipsoidal-height', campaign.tide, `${path}.h`, (tide) =>
        withSite(campaign, site.id, (s) => ({ ...s, h: { ...h, tide } })),
      ),
      ...frameMistakes(site, h, `${path}.h`, (metres) =>
        withSite(campaign, site.id, (s) => ({ ...s, h: { ...h, value: h.value + metres } })),
      ),
    );
  }
  if (site.g && Math.abs(site.g.value - STANDARD_GRAVITY) < 5e-5) {
    const height = site.h?.value ?? 0;
    const local = normalGravity(GRS80, site.latitudeRad, height);
    found.push({
      code: 'standard-gravity',
      path: `${path}.g`,
      mistake: 'g is the standard value 9.80665 m/s², not that of the place',
      lookAt: 'a gravity measurement, or leave g out: normal gravity is nearer',
      corrected: withSite(campaign, site.id, (s) => ({ ...s, g: exactly(local) })),
      uOffset: 0,
    });
  }
  return found;
}

function determinationMistakes(campaign: Campaign, site: Site, d: Determination, n: number): Mistake[] {
  const path = `sites.${site.id}.determinations.${n}`;
  const change = (edit: (d: Determination) => Determination) => withDetermination(campaign, site.id, n, edit);
  const found: Mistake[] = [];
  const tides = (key: string, measured: Measured, quantity: Parameters<typeof assumedTide>[0]) =>
    tideMistakes(measured, quantity, campaign.tide, `${path}.${key}`, (tide) =>
      change((x) => ({ ...x, [key]: { ...measured, tide } }) as Determination),
    );
  if ('h' in d && d.h) {
    const h = d.h;
    found.push(
      ...tides('h', h, 'ellipsoidal-height'),
      ...frameMistakes(site, h, `${path}.h`, (metres) =>
        change((x) => ({ ...x, h: { ...h, value: h.value + metres } }) as Determination),
      ),
    );
  }
  if ('zeta' in d) found.push(...tides('zeta', d.zeta, 'geoid-height'));
  if ('N' in d) found.push(...tides('N', d.N, 'geoid-height'));
  if ('C' in d) found.push(...tides('C', d.C, 'geopotential-number'));
  if ('H' in d) found.push(...tides('H', d.H, 'physical-height'));
  if ('W' in d) found.push(...tides('W', d.W, 'potential'));
  if ('datum' in d) found.push(...datumMistakes(campaign, site, d, n, path));
  found.push(...geoidKindMistakes(d, path, change));
  if (d.kind === 'geopotential-number') found.push(...standardGravityNumber(site, d, path, change));
  if (d.kind === 'levelled-from') found.push(...levellingMistakes(d, path, change));
  return found;
}

function tideMistakes(
  measured: Measured,
  quantity: Parameters<typeof assumedTide>[0],
  campaignTide: TideSystem,
  path: string,
  correct: (tide: TideSystem) => Campaign,
): Mistake[] {
  const now = measured.tide ?? assumedTide(quantity, campaignTide);
  return TIDES.filter((t) => t !== now).map((tide) => ({
    code: 'tide-label',
    path,
    mistake: `it is in the ${tide} tide, not in the ${now} tide`,
    lookAt: 'the header of the model or the report of the heights',
    corrected: correct(tide),
    uOffset: 0,
  }));
}

/** h in ITRF2020 taken for ETRF2000, or the other way round, at the epoch stated or at 2020. */
function frameMistakes(site: Site, h: Measured, path: string, correct: (metres: number) => Campaign): Mistake[] {
  const epoch = h.epochYear ?? 2020;
  const shift = frameChangeOfHeight(site.latitudeRad, site.longitudeRad, h.value, 'ITRF2020', 'ETRF2000', epoch);
  const words = (from: string, to: string) => ({
    code: 'frame',
    path,
    mistake: `h is in ${from}, while the geoid model wants ${to} (epoch ${epoch})`,
    lookAt: 'frame and epoch of the GNSS processing and of the geoid model',
    uOffset: 0,
  });
  return [
    { ...words('ITRF2020', 'ETRF2000'), corrected: correct(shift) },
    { ...words('ETRF2000', 'ITRF2020'), corrected: correct(-shift) },
  ];
}

type WithDatum = Extract<Determination, { readonly datum: string }>;

function datumMistakes(campaign: Campaign, site: Site, d: WithDatum, n: number, path: string): Mistake[] {
  const stated = campaign.datums.find((x) => x.id === d.datum);
  const W0 = stated?.W0.value ?? BUILT_IN_W0_M2S2[d.datum]!;
  /** the same determination with W₀ moved by so much; the datum's own uncertainty stays with the others */
  const moved = (by: number): Campaign => {
    const id = 'built-in:moved';
    const datum: Datum = {
      id,
      W0: stated ? { ...stated.W0, value: W0 + by } : exactly(W0 + by, campaign.tide),
      origin: stated?.origin ?? null,
      estimateOffset: false,
      estimateTilt: false,
    };
    const base = withDetermination(campaign, site.id, n, (x) => ({ ...x, datum: id }) as Determination);
    return { ...base, datums: [...base.datums, datum] };
  };
  const step = W0_TT.value - W0_IHRS.value;
  const mistake = (code: string, by: number, what: string, lookAt: string): Mistake => ({
    code,
    path: `${path}.datum`,
    mistake: what,
    lookAt,
    corrected: moved(by),
    uOffset: 0,
  });
  const found = [
    mistake(
      'reference-potential',
      step,
      'W₀ is that of the IHRS where the one behind TT belongs',
      'to which W₀ the height was referred',
    ),
    mistake(
      'reference-potential',
      -step,
      'W₀ is the one behind TT where that of the IHRS belongs',
      'to which W₀ the height was referred',
    ),
  ];
  if (d.kind === 'gnss-quasigeoid' || d.kind === 'gnss-geoid') {
    const zeroDegree = BUILT_IN_W0_M2S2['u0-grs80']! - W0_IHRS.value;
    const look = 'the description of the geoid model: zero-degree term, GM and W₀ behind it';
    const signs = [1, -1] as const;
    for (const sign of signs) {
      const missing = sign > 0;
      found.push(
        mistake(
          'zero-degree-term',
          sign * zeroDegree,
          `the zero-degree term W₀ − U₀ is ${missing ? 'missing in' : 'already in'} the model`,
          look,
        ),
        mistake(
          'zero-degree-gm',
          sign * GM_POTENTIAL_STEP,
          `the GM part of the zero-degree term is ${missing ? 'missing in' : 'twice in'} the model`,
          look,
        ),
      );
    }
  }
  if ((d.kind === 'geopotential-number' || 'H' in d) && stated)
    found.push(...originMistakes(campaign, site, stated, path));
  return found;
}

/** Heights refer to a benchmark, and so does their permanent tide. */
function originMistakes(campaign: Campaign, site: Site, datum: Datum, path: string): Mistake[] {
  const withOrigin = (origin: Datum['origin']): Campaign => ({
    ...campaign,
    datums: campaign.datums.map((x) => (x.id === datum.id ? { ...x, origin } : x)),
  });
  if (datum.origin)
    return [
      {
        code: 'datum-origin',
        path: `datums.${datum.id}.origin`,
        mistake: 'the heights do not refer to that benchmark',
        lookAt: 'the definition of the height datum',
        corrected: withOrigin(null),
        uOffset: 0,
      },
    ];
  // where the benchmark lies is not known; somewhere within five degrees of latitude of the site is what can be said
  const spread = degToRad(5);
  const slope = 2 * 2.8841 * Math.sin(site.latitudeRad) * Math.cos(site.latitudeRad) * 0.7;
  return [
    {
      code: 'datum-origin',
      path: `${path}.datum`,
      mistake: `datum ${datum.id} has no origin: the tide of its benchmark is forgotten`,
      lookAt: 'where the benchmark of the height datum lies; state "origin"',
      corrected: withOrigin({ latitudeRad: site.latitudeRad as Radians, longitudeRad: null }),
      uOffset: (slope * spread) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2,
    },
  ];
}

function geoidKindMistakes(
  d: Determination,
  path: string,
  change: (edit: (d: Determination) => Determination) => Campaign,
): Mistake[] {
  if (d.kind === 'gnss-quasigeoid') {
    const { zeta, ...rest } = d;
    return [
      {
        code: 'geoid-for-quasigeoid',
        path: `${path}.zeta`,
        mistake: 'it is a geoid height N, not a height anomaly ζ',
        lookAt: 'whether the model is a geoid or a quasigeoid',
        corrected: change(() => ({ ...rest, kind: 'gnss-geoid', N: zeta, g: null, meanGravityFactor: null })),
        uOffset: 0,
      },
    ];
  }
  if (d.kind === 'gnss-geoid') {
    const { N, g: _g, meanGravityFactor: _k, ...rest } = d;
    return [
      {
        code: 'geoid-for-quasigeoid',
        path: `${path}.N`,
        mistake: 'it is a height anomaly ζ, not a geoid height N',
        lookAt: 'whether the model is a geoid or a quasigeoid',
        corrected: change(() => ({ ...rest, kind: 'gnss-quasigeoid', zeta: N })),
        uOffset: 0,
      },
    ];
  }
  return [];
}

/** C made from a height with standard gravity instead of the gravity along the plumb line. */
function standardGravityNumber(
  site: Site,
  d: Extract<Determination, { readonly kind: 'geopotential-number' }>,
  path: string,
  change: (edit: (d: Determination) => Determination) => Campaign,
): Mistake[] {
  const height = d.C.value / STANDARD_GRAVITY;
  const surface = site.g?.value ?? normalGravity(GRS80, site.latitudeRad, height);
  const mean = surface + 4.24e-7 * height;
  return [
    {
      code: 'standard-gravity',
      path: `${path}.C`,
      mistake: 'C was made from a height with standard gravity 9.80665 m/s²',
      lookAt: 'how the geopotential number was computed',
      corrected: change((x) => ({ ...x, C: { ...d.C, value: mean * height } }) as Determination),
      uOffset: 0,
    },
  ];
}

function levellingMistakes(
  d: Extract<Determination, { readonly kind: 'levelled-from' }>,
  path: string,
  change: (edit: (d: Determination) => Determination) => Campaign,
): Mistake[] {
  const found: Mistake[] = [
    {
      code: 'levelling-sign',
      path: `${path}.dH`,
      mistake: 'the levelled height difference has the wrong sign',
      lookAt: 'from which site to which the line was levelled',
      corrected: change((x) => ({ ...x, dH: { ...d.dH, value: -d.dH.value } }) as Determination),
      uOffset: 0,
    },
  ];
  if (d.g)
    found.push({
      code: Math.abs(d.g.value - STANDARD_GRAVITY) < 5e-5 ? 'standard-gravity' : 'end-point-gravity',
      path: `${path}.g`,
      mistake: 'g of the line is not its mean: standard gravity, or that of one end',
      lookAt: 'gravity along the line; left out, the mean of the two sites is taken',
      corrected: change((x) => ({ ...x, g: null }) as Determination),
      uOffset: 0,
    });
  return found;
}
