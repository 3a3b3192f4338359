import { FIBRE_CARRIER_HZ, FIBRE_GROUP_INDEX } from '../clocks/fibre-noise.js';
import { intersectionOfIntervals, totalLengthS } from '../clocks/intervals.js';
import { geodesicDistanceM } from '../earth/geodesic-distance.js';
import { LOVE_NUMBERS } from '../earth/permanent-tide.js';
import { degToRad } from '../quantity/index.js';
import type {
  Campaign,
  ClassicalMethods,
  Clock,
  Datum,
  Determination,
  Flywheel,
  GravityModelPotential,
  Link,
  LinkFibre,
  Measured,
  Measurement,
  MeasurementCorrelation,
  Remarks,
  SeriesUse,
  Site,
  Source,
  Stability,
  TimeInterval,
  Transition,
  TransportedClock,
} from './campaign.js';
import { toOceanLoading, toPlace, toPole, toRoute } from './places.js';
import type {
  campaignSchema,
  correlation,
  datum,
  measurement,
  methods,
  site,
  source,
  transition,
} from './schema/campaign-schema.js';
import type { ReadOf } from './schema/descriptor.js';
import type { determination } from './schema/determinations.js';
import type { clock, interval, link } from './schema/instruments.js';

/** These keys of an object, where they stand. */
function keep<T, K extends keyof T>(from: T, ...keys: K[]): Pick<T, K> {
  const kept: Partial<T> = {};
  for (const key of keys) if (from[key] !== undefined) kept[key] = from[key];
  return kept as Pick<T, K>;
}

const remarksOf = (from: Remarks): Remarks => keep(from, 'note', 'reference', 'date');

const toInterval = (i: ReadOf<typeof interval>): TimeInterval => ({ ...remarksOf(i), startMs: i.start, endMs: i.end });

const toSource = (s: ReadOf<typeof source>): Source => ({
  ...remarksOf(s),
  ...keep(s, 'id', 'name', 'correlation'),
  ...(s.correlationLength === undefined ? {} : { correlationLengthM: s.correlationLength }),
});

const toDatum = (d: ReadOf<typeof datum>): Datum => ({
  ...remarksOf(d),
  ...keep(d, 'id', 'name', 'W0', 'frame'),
  origin: d.origin
    ? {
        ...remarksOf(d.origin),
        latitudeRad: degToRad(d.origin.lat),
        longitudeRad: d.origin.lon === undefined ? null : degToRad(d.origin.lon),
      }
    : null,
  estimateOffset: d.estimateOffset ?? false,
  estimateTilt: d.estimateTilt ?? false,
  ...(d.epoch === undefined ? {} : { epochYear: d.epoch }),
});

const toTransition = (t: ReadOf<typeof transition>): Transition => ({
  ...remarksOf(t),
  id: t.id,
  offset: t.offset ?? null,
  frequency: t.frequency ?? null,
});

/** Stands until the file has been read, which is before the campaign leaves the reader (with-files.ts). */
const NOT_SUMMED: GravityModelPotential = {
  maxDegree: 0,
  heightM: Number.NaN,
  potentialM2s2: Number.NaN,
  perHeightMs2: Number.NaN,
  commissionM2s2: Number.NaN,
  omissionM2s2: Number.NaN,
};

function toDetermination(d: ReadOf<typeof determination>): Determination {
  const common = {
    ...remarksOf(d),
    check: d.use === 'check',
    candidate: d.candidate ?? false,
    cost: d.cost ?? null,
  };
  const datumOf = ({ datum }: { readonly datum?: string }): string => datum ?? 'ihrs';
  switch (d.kind) {
    case 'potential':
      return { ...common, kind: d.kind, W: d.W };
    case 'geopotential-number':
      return { ...common, kind: d.kind, C: d.C, datum: datumOf(d) };
    case 'normal-height':
      return { ...common, kind: d.kind, H: d.H, datum: datumOf(d), ...keep(d, 'field') };
    case 'normal-orthometric-height':
      return { ...common, kind: d.kind, H: d.H, datum: datumOf(d) };
    case 'orthometric-height':
      return { ...common, kind: d.kind, H: d.H, g: d.g ?? null, datum: datumOf(d) };
    case 'dynamic-height':
      return { ...common, kind: d.kind, H: d.H, gammaRef: d.gammaRef ?? null, datum: datumOf(d) };
    case 'gnss-quasigeoid':
      return { ...common, kind: d.kind, h: d.h ?? null, zeta: d.zeta, datum: datumOf(d) };
    case 'gnss-geoid':
      return {
        ...common,
        kind: d.kind,
        h: d.h ?? null,
        N: d.N,
        g: d.g ?? null,
        meanGravityFactor: d.meanGravityFactor ?? null,
        datum: datumOf(d),
      };
    case 'gravity-model':
      return {
        ...common,
        kind: d.kind,
        h: d.h ?? null,
        model: {
          ...remarksOf(d.model),
          file: d.model.file,
          maxDegree: d.model.maxDegree ?? null,
          tide: d.model.tide ?? null,
        },
        commissionM: d.commission ?? null,
        omissionM: d.omission ?? null,
        atMarker: NOT_SUMMED,
      };
    case 'levelled-from':
      return {
        ...common,
        kind: d.kind,
        site: d.site,
        dH: d.dH,
        g: d.g ?? null,
        ...(d.length === undefined ? {} : { lengthM: d.length }),
        ...keep(d, 'b', 'k'),
      };
  }
}

const toSite = (s: ReadOf<typeof site>): Site => ({
  ...remarksOf(s),
  ...keep(s, 'id', 'name'),
  ...toPlace(s),
  g: s.g ?? null,
  gradient: s.gradient ?? null,
  variable: s.variable ?? null,
  ...(s.oceanLoading === undefined ? {} : { oceanLoading: toOceanLoading(s.oceanLoading) }),
  determinations: (s.determinations ?? []).map(toDetermination),
  candidate: s.candidate ?? false,
  cost: s.cost ?? null,
});

type StabilityInFile = Partial<Stability> & Remarks;

const toStability = (s: StabilityInFile = {}): Stability => ({
  ...remarksOf(s),
  white: s.white ?? 0,
  flicker: s.flicker ?? 0,
  phase: s.phase ?? 0,
});

/** Share of the window that the intervals cover; without a window, of the span from their first start to their last end. */
function coveredShare(available: readonly TimeInterval[], window: TimeInterval | null): number {
  const whole = window ?? {
    startMs: Math.min(...available.map((i) => i.startMs)),
    endMs: Math.max(...available.map((i) => i.endMs)),
  };
  return totalLengthS(intersectionOfIntervals([available, [whole]])) / totalLengthS([whole]);
}

type InstrumentInFile = ReadOf<typeof clock> | ReadOf<typeof link>;

const toPieces = (pieces: NonNullable<InstrumentInFile['systematic']>): Clock['systematic'] =>
  pieces.map((p) => ({
    ...remarksOf(p),
    ...keep(p, 'name', 'u'),
    source: p.source ?? null,
    dof: p.dof ?? null,
  }));

function toInstrument(i: InstrumentInFile, window: TimeInterval | null) {
  const available = i.available?.map(toInterval) ?? null;
  return {
    ...remarksOf(i),
    ...keep(i, 'id', 'name'),
    systematic: toPieces(i.systematic ?? []),
    stability: toStability(i.stability),
    uptime: available === null ? (i.uptime ?? 1) : coveredShare(available, window),
    available,
    candidate: i.candidate ?? false,
    cost: i.cost ?? null,
  };
}

const toFlywheel = (f: NonNullable<ReadOf<typeof clock>['flywheel']>): Flywheel => ({
  ...remarksOf(f),
  white: f.stability.white ?? 0,
  flicker: f.stability.flicker ?? 0,
  randomWalk: f.stability.randomWalk ?? 0,
  phase: f.stability.phase ?? 0,
  driftPerDay: f.driftPerDay ?? 0,
  cycleS: f.cycle ?? null,
});

const toClock = (c: ReadOf<typeof clock>, window: TimeInterval | null): Clock => ({
  ...toInstrument(c, window),
  ...keep(c, 'site', 'transition'),
  tie: (c.tie ?? []).map((step) => ({ ...remarksOf(step), ...keep(step, 'name', 'dH') })),
  ...(c.flywheel === undefined ? {} : { flywheel: toFlywheel(c.flywheel) }),
});

/** 1 km in m: the fibre's noise is stated per km. */
const KM = 1000;

const toFibre = (
  f: NonNullable<ReadOf<typeof link>['fibre']>,
  lengthM: number | undefined,
  geodesicM: () => number,
): LinkFibre => ({
  ...remarksOf(f),
  lengthM: lengthM ?? geodesicM(),
  lengthIsGeodesic: lengthM === undefined,
  noiseRad2HzPerM: f.noise / KM,
  bandwidthHz: f.bandwidth,
  carrierHz: f.carrier ?? FIBRE_CARRIER_HZ,
  groupIndex: f.groupIndex ?? FIBRE_GROUP_INDEX,
});

const toTransported = (t: NonNullable<ReadOf<typeof link>['transported']>): TransportedClock => ({
  ...remarksOf(t),
  clock: t.clock,
  reproducibility: t.reproducibility ?? 0,
  sideBySide: t.sideBySide.map((s) => ({
    ...remarksOf(s),
    when: s.when,
    y: s.y ?? null,
    timeS: s.time ?? null,
    dH: s.dH,
    systematic: s.systematic === undefined ? null : toPieces(s.systematic),
    startMs: s.start ?? null,
    endMs: s.end ?? null,
  })),
});

const toLink = (
  l: ReadOf<typeof link>,
  window: TimeInterval | null,
  geodesicM: (from: string, to: string) => number,
): Link => ({
  ...toInstrument(l, window),
  ...keep(l, 'from', 'to'),
  kind: l.kind ?? null,
  lengthM: l.length ?? null,
  segments: l.segments ?? 1,
  ...(l.route === undefined ? {} : { route: toRoute(l.route) }),
  ...(l.fibre === undefined ? {} : { fibre: toFibre(l.fibre, l.length, () => geodesicM(l.from, l.to)) }),
  ...(l.transported === undefined ? {} : { transported: toTransported(l.transported) }),
});

const toMethods = (m: ReadOf<typeof methods>): ClassicalMethods => ({
  ...remarksOf(m),
  levelling: m.levelling
    ? {
        ...remarksOf(m.levelling),
        bRootM: m.levelling.b ?? 0,
        k: m.levelling.k ?? 0,
        detour: m.levelling.detour ?? 1,
      }
    : null,
  gnss: m.gnss
    ? {
        ...remarksOf(m.gnss),
        hM: m.gnss.h,
        geoidM: m.gnss.geoid,
        correlationLengthM: m.gnss.correlationLength ?? null,
        correlation: m.gnss.correlation ?? 0,
      }
    : null,
});

/** Stands until the series has been reduced, which is before the campaign leaves the reader (with-series.ts). */
const NOT_REDUCED: Measured = {
  value: Number.NaN,
  u: 0,
  parts: [],
  distribution: 'normal',
  dof: null,
  tide: null,
  text: null,
};

const toSeries = (s: NonNullable<ReadOf<typeof measurement>['series']>): SeriesUse => ({
  ...remarksOf(s),
  ...keep(s, 'file', 'columns'),
  ...(s.tau === undefined ? {} : { tauS: s.tau }),
});

const toMeasurement = (m: ReadOf<typeof measurement>): Measurement => ({
  ...remarksOf(m),
  id: m.id ?? null,
  link: m.link,
  y: m.y === undefined ? NOT_REDUCED : m.tide === undefined ? m.y : { ...m.y, tide: m.tide },
  ...(m.series === undefined ? {} : { series: toSeries(m.series) }),
  includesSystematic: m.includesSystematic ?? false,
  check: m.use === 'check',
  startMs: m.start ?? null,
  endMs: m.end ?? null,
});

const toCorrelation = (c: ReadOf<typeof correlation>): MeasurementCorrelation => ({
  ...remarksOf(c),
  between: [c.between[0] as string, c.between[1] as string],
  rho: c.rho,
});

/** A file that was read without fault, as the campaign that everything else works on: defaults put in, radians, names as
 *  the types have them. */
export function toCampaign(file: ReadOf<typeof campaignSchema>): Campaign {
  const window = file.window ? toInterval(file.window) : null;
  const sites = file.sites.map(toSite);
  const siteOf = (clock: string) => {
    const { site } = (file.clocks ?? []).find(({ id }) => id === clock)!;
    return sites.find(({ id }) => id === site)!;
  };
  const geodesicM = (from: string, to: string) => geodesicDistanceM(siteOf(from), siteOf(to));
  return {
    ...remarksOf(file),
    ...keep(file, 'format', 'title'),
    tide: file.tide ?? 'mean',
    window,
    targetM: file.target ?? null,
    effectM: file.effect ?? null,
    love: { ...remarksOf(file.love ?? {}), h2: file.love?.h2 ?? LOVE_NUMBERS.h2, k2: file.love?.k2 ?? LOVE_NUMBERS.k2 },
    ...(file.epoch === undefined ? {} : { epochYear: file.epoch }),
    ...(file.pole === undefined ? {} : { pole: toPole(file.pole) }),
    sources: (file.sources ?? []).map(toSource),
    datums: (file.datums ?? []).map(toDatum),
    transitions: (file.transitions ?? []).map(toTransition),
    sites,
    clocks: (file.clocks ?? []).map((c) => toClock(c, window)),
    links: (file.links ?? []).map((l) => toLink(l, window, geodesicM)),
    measurements: (file.measurements ?? []).map(toMeasurement),
    correlations: (file.correlations ?? []).map(toCorrelation),
    ...(file.methods === undefined ? {} : { methods: toMethods(file.methods) }),
  };
}
