import { FIBRE_CARRIER_HZ, FIBRE_GROUP_INDEX } from '../clocks/fibre-noise.js';
import { degToRad, type Radians, radToDeg } from '../quantity/index.js';
import type {
  Campaign,
  ClassicalMethods,
  Clock,
  Datum,
  Determination,
  Flywheel,
  Link,
  LinkFibre,
  Measured,
  Measurement,
  Remarks,
  Route,
  SeriesUse,
  Site,
  Source,
  Stability,
  TimeInterval,
  Transition,
  TransportedClock,
} from './campaign.js';
import { fromPole, fromSitePosition, heightIsOfPosition, positionHolds } from './places.js';
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
import type { oceanLoading, route } from './schema/places.js';

/** The entries that say something: neither null, undefined, false nor an empty list. */
type Told<T> = { [K in keyof T]?: Exclude<T[K], null | undefined | false> };

function told<T extends object>(entries: T): Told<T> {
  const kept = Object.entries(entries).filter(
    ([, v]) => v !== null && v !== undefined && v !== false && !(Array.isArray(v) && v.length === 0),
  );
  return Object.fromEntries(kept) as Told<T>;
}

const remarksOf = ({ note, reference, date }: Remarks) => told({ note, reference, date });

/** The number of degrees with the fewest digits that is these radians; 52.2961 comes back as 52.2961. */
export function degreesOf(radians: Radians): number {
  const near = radToDeg(radians);
  for (let digits = 1; digits < 17; digits++) {
    const short = Number(near.toPrecision(digits));
    if (degToRad(short) === radians) return short;
  }
  // the conversion there and back may miss by a unit in the last place
  const step = Math.abs(near) * 2 ** -53 || Number.MIN_VALUE;
  for (const off of [0, -1, 1, -2, 2, -3, 3]) if (degToRad(near + off * step) === radians) return near + off * step;
  return near;
}

const fromInterval = (i: TimeInterval): ReadOf<typeof interval> => ({
  start: i.startMs,
  end: i.endMs,
  ...remarksOf(i),
});

const fromSource = (s: Source): ReadOf<typeof source> => ({
  id: s.id,
  ...told({ name: s.name }),
  ...(s.correlation === undefined ? {} : { correlation: s.correlation }),
  ...told({ correlationLength: s.correlationLengthM }),
  ...remarksOf(s),
});

const fromDatum = (d: Datum): ReadOf<typeof datum> => ({
  id: d.id,
  ...told({ name: d.name }),
  W0: d.W0,
  ...(d.origin
    ? {
        origin: {
          lat: degreesOf(d.origin.latitudeRad),
          ...(d.origin.longitudeRad === null ? {} : { lon: degreesOf(d.origin.longitudeRad) }),
          ...remarksOf(d.origin),
        },
      }
    : {}),
  ...told({ estimateOffset: d.estimateOffset, estimateTilt: d.estimateTilt, frame: d.frame, epoch: d.epochYear }),
  ...remarksOf(d),
});

const fromTransition = (t: Transition): ReadOf<typeof transition> => ({
  id: t.id,
  ...told({ offset: t.offset, frequency: t.frequency }),
  ...remarksOf(t),
});

const candidateOf = ({ candidate, cost }: { readonly candidate: boolean; readonly cost: number | null }) => ({
  ...told({ candidate }),
  ...(cost === null ? {} : { cost }),
});

function fromDetermination(d: Determination): ReadOf<typeof determination> {
  const common = { ...(d.check ? { use: 'check' as const } : {}), ...candidateOf(d), ...remarksOf(d) };
  switch (d.kind) {
    case 'potential':
      return { kind: d.kind, W: d.W, ...common };
    case 'geopotential-number':
      return { kind: d.kind, datum: d.datum, C: d.C, ...common };
    case 'normal-height':
      return { kind: d.kind, datum: d.datum, H: d.H, ...told({ field: d.field }), ...common };
    case 'normal-orthometric-height':
      return { kind: d.kind, datum: d.datum, H: d.H, ...common };
    case 'orthometric-height':
      return { kind: d.kind, datum: d.datum, H: d.H, ...told({ g: d.g }), ...common };
    case 'dynamic-height':
      return { kind: d.kind, datum: d.datum, H: d.H, ...told({ gammaRef: d.gammaRef }), ...common };
    case 'gnss-quasigeoid':
      return { kind: d.kind, datum: d.datum, zeta: d.zeta, ...told({ h: d.h }), ...common };
    case 'gnss-geoid':
      return {
        kind: d.kind,
        datum: d.datum,
        N: d.N,
        ...told({ h: d.h, g: d.g, meanGravityFactor: d.meanGravityFactor }),
        ...common,
      };
    case 'levelled-from':
      return {
        kind: d.kind,
        site: d.site,
        dH: d.dH,
        ...told({ g: d.g, length: d.lengthM, b: d.b, k: d.k }),
        ...common,
      };
    case 'gravity-model':
      return {
        kind: d.kind,
        model: {
          file: d.model.file,
          ...told({ maxDegree: d.model.maxDegree, tide: d.model.tide }),
          ...remarksOf(d.model),
        },
        ...told({ h: d.h }),
        ...(d.commissionM === null ? {} : { commission: d.commissionM }),
        ...(d.omissionM === null ? {} : { omission: d.omissionM }),
        ...common,
      };
  }
}

const fromOceanLoading = (o: NonNullable<Site['oceanLoading']>[number]): ReadOf<typeof oceanLoading> => ({
  constituent: o.constituent,
  amplitude: o.amplitudeM2s2,
  phase: degreesOf(o.phaseLagRad as Radians),
  ...remarksOf(o),
});

const fromRoute = (r: Route): ReadOf<typeof route> => ({
  ...told({
    via: r.via.map((p) => ({
      lat: degreesOf(p.latitudeRad),
      lon: degreesOf(p.longitudeRad),
      ...(p.heightM === 0 ? {} : { height: p.heightM }),
      ...(p.timeMs === null ? {} : { time: p.timeMs }),
      ...remarksOf(p),
    })),
  }),
  ...(r.departureMs === null ? {} : { departure: r.departureMs }),
  ...(r.arrivalMs === null ? {} : { arrival: r.arrivalMs }),
  ...remarksOf(r),
});

const fromSite = (s: Site): ReadOf<typeof site> => ({
  id: s.id,
  ...told({ name: s.name }),
  ...(s.position && positionHolds(s)
    ? { position: fromSitePosition(s.position) }
    : { lat: degreesOf(s.latitudeRad), lon: degreesOf(s.longitudeRad) }),
  ...told({ h: heightIsOfPosition(s) ? null : s.h, g: s.g, gradient: s.gradient, variable: s.variable }),
  ...(s.oceanLoading === undefined ? {} : { oceanLoading: s.oceanLoading.map(fromOceanLoading) }),
  ...(s.determinations.length > 0 ? { determinations: s.determinations.map(fromDetermination) } : {}),
  ...candidateOf(s),
  ...remarksOf(s),
});

function fromStability(s: Stability) {
  const terms = Object.fromEntries(
    (['white', 'flicker', 'phase'] as const).filter((k) => s[k] !== 0).map((k) => [k, s[k]]),
  ) as Partial<Stability>;
  const whole = { ...terms, ...remarksOf(s) };
  return Object.keys(whole).length > 0 ? { stability: whole } : {};
}

const fromInstrument = (i: Clock | Link) => ({
  ...(i.systematic.length > 0 ? { systematic: i.systematic.map(withoutNoDof) } : {}),
  ...fromStability(i.stability),
  ...(i.available ? { available: i.available.map(fromInterval) } : i.uptime === 1 ? {} : { uptime: i.uptime }),
  ...candidateOf(i),
  ...remarksOf(i),
});

type Piece = NonNullable<ReadOf<typeof clock>['systematic']>[number];

const withoutNoDof = ({ dof, ...p }: Clock['systematic'][number]): Piece => (dof === null ? p : { ...p, dof });

const nonZero = <T extends { readonly [key: string]: number }>(terms: T): Partial<T> =>
  Object.fromEntries(Object.entries(terms).filter(([, v]) => v !== 0)) as Partial<T>;

const fromFlywheel = (f: Flywheel): NonNullable<ReadOf<typeof clock>['flywheel']> => ({
  stability: nonZero({ white: f.white, flicker: f.flicker, randomWalk: f.randomWalk, phase: f.phase }),
  ...nonZero({ driftPerDay: f.driftPerDay }),
  ...(f.cycleS === null ? {} : { cycle: f.cycleS }),
  ...remarksOf(f),
});

const fromFibre = (f: LinkFibre): NonNullable<ReadOf<typeof link>['fibre']> => ({
  noise: perKm(f.noiseRad2HzPerM),
  bandwidth: f.bandwidthHz,
  ...(f.carrierHz === FIBRE_CARRIER_HZ ? {} : { carrier: f.carrierHz }),
  ...(f.groupIndex === FIBRE_GROUP_INDEX ? {} : { groupIndex: f.groupIndex }),
  ...remarksOf(f),
});

/** The number per km with the fewest digits that is this one per m. */
function perKm(perM: number): number {
  for (let digits = 1; digits < 17; digits++) {
    const short = Number((1000 * perM).toPrecision(digits));
    if (short / 1000 === perM) return short;
  }
  return 1000 * perM;
}

const fromTransported = (t: TransportedClock): NonNullable<ReadOf<typeof link>['transported']> => ({
  clock: t.clock,
  ...nonZero({ reproducibility: t.reproducibility }),
  sideBySide: t.sideBySide.map((s) => ({
    when: s.when,
    ...told({ y: s.y, time: s.timeS }),
    dH: s.dH,
    ...(s.systematic === null ? {} : { systematic: s.systematic.map(withoutNoDof) }),
    ...(s.startMs === null ? {} : { start: s.startMs }),
    ...(s.endMs === null ? {} : { end: s.endMs }),
    ...remarksOf(s),
  })),
  ...remarksOf(t),
});

const fromMethods = ({ levelling, gnss, ...m }: ClassicalMethods): ReadOf<typeof methods> => ({
  ...(levelling
    ? {
        levelling: {
          b: levelling.bRootM,
          k: levelling.k,
          ...(levelling.detour === 1 ? {} : { detour: levelling.detour }),
          ...remarksOf(levelling),
        },
      }
    : {}),
  ...(gnss
    ? {
        gnss: {
          h: gnss.hM,
          geoid: gnss.geoidM,
          ...(gnss.correlationLengthM === null
            ? nonZero({ correlation: gnss.correlation })
            : { correlationLength: gnss.correlationLengthM }),
          ...remarksOf(gnss),
        },
      }
    : {}),
  ...remarksOf(m),
});

const fromClock = (c: Clock): ReadOf<typeof clock> => ({
  id: c.id,
  ...told({ name: c.name }),
  site: c.site,
  transition: c.transition,
  ...(c.tie.length > 0 ? { tie: c.tie } : {}),
  ...fromInstrument(c),
  ...(c.flywheel ? { flywheel: fromFlywheel(c.flywheel) } : {}),
});

const fromLink = (l: Link): ReadOf<typeof link> => ({
  id: l.id,
  ...told({ name: l.name }),
  from: l.from,
  to: l.to,
  ...told({ kind: l.kind }),
  ...(l.lengthM === null ? {} : { length: l.lengthM }),
  ...(l.segments === 1 ? {} : { segments: l.segments }),
  ...fromInstrument(l),
  ...(l.route ? { route: fromRoute(l.route) } : {}),
  ...(l.fibre ? { fibre: fromFibre(l.fibre) } : {}),
  ...(l.transported ? { transported: fromTransported(l.transported) } : {}),
});

const withoutTide = (m: Measured): Measured => ({ ...m, tide: null });

const fromSeries = (s: SeriesUse): NonNullable<ReadOf<typeof measurement>['series']> => ({
  file: s.file,
  ...told({ columns: s.columns, tau: s.tauS }),
  ...remarksOf(s),
});

const fromMeasurement = (m: Measurement): ReadOf<typeof measurement> => ({
  ...told({ id: m.id }),
  link: m.link,
  ...(m.series ? { series: fromSeries(m.series) } : { y: withoutTide(m.y) }),
  ...told({ tide: m.y.tide, includesSystematic: m.includesSystematic }),
  ...(m.check ? { use: 'check' as const } : {}),
  ...(m.startMs === null ? {} : { start: m.startMs }),
  ...(m.endMs === null ? {} : { end: m.endMs }),
  ...remarksOf(m),
});

const fromCorrelation = (c: Campaign['correlations'][number]): ReadOf<typeof correlation> => ({
  between: c.between,
  rho: c.rho,
  ...remarksOf(c),
});

/** A campaign as its file says it, defaults left out where the reader puts them in. Undoes `toCampaign`. */
export function fromCampaign(c: Campaign): ReadOf<typeof campaignSchema> {
  return {
    format: c.format,
    ...told({ title: c.title }),
    tide: c.tide,
    ...(c.window ? { window: fromInterval(c.window) } : {}),
    ...told({ target: c.targetM, effect: c.effectM }),
    love: c.love,
    ...(c.epochYear === undefined ? {} : { epoch: c.epochYear }),
    ...(c.pole ? { pole: fromPole(c.pole) } : {}),
    ...told({
      sources: c.sources.map(fromSource),
      datums: c.datums.map(fromDatum),
      transitions: c.transitions.map(fromTransition),
    }),
    sites: c.sites.map(fromSite),
    ...told({
      clocks: c.clocks.map(fromClock),
      links: c.links.map(fromLink),
      measurements: c.measurements.map(fromMeasurement),
      correlations: c.correlations.map(fromCorrelation),
    }),
    ...(c.methods ? { methods: fromMethods(c.methods) } : {}),
    ...remarksOf(c),
  };
}
