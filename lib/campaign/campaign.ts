import type { FlywheelNoise } from '../clocks/dead-time.js';
import type { FibreNoise } from '../clocks/fibre-noise.js';
import type { MeanBasis } from '../clocks/mean-uncertainty.js';
import type { OceanLoadingConstituent } from '../earth/earth-tide/ocean-loading.js';
import type { PolePosition } from '../earth/earth-tide/pole-tide.js';
import type { GridExcerpt, InterpolationMethod } from '../earth/geoid-grid/interpolation.js';
import type { StatedPosition } from '../earth/projected-position/resolve-position.js';
import type { TideSystem } from '../earth/tide-system.js';
import type { Radians } from '../quantity/radians.js';

export type { TideSystem };

export type Distribution = 'normal' | 'uniform' | 'triangular' | 't';

/** One piece of an input's standard uncertainty. `source` null: independent of everything else. */
export interface UncertaintyPart extends Remarks {
  /** standard uncertainty, SI, > 0 */
  readonly u: number;
  /** id of a shared error source, or null */
  readonly source: string | null;
}

/** Text that may stand on any object of the file; kept and shown, never computed with. */
export interface Remarks {
  readonly note?: string;
  readonly reference?: string;
  readonly date?: string;
}

/** A measured number as stated in the file, in SI. */
export interface Measured extends Remarks {
  /** SI value as stated, before any tide or frame conversion */
  readonly value: number;
  /** combined standard uncertainty, SI; 0 if exact. u² = Σ parts².u */
  readonly u: number;
  /** pieces of u; empty if exact; pieces add as squares */
  readonly parts: readonly UncertaintyPart[];
  readonly distribution: Distribution;
  /** degrees of freedom; null means infinitely many. For `t` it is the ν of JCGM 101 6.4.9 and u its scale */
  readonly dof: number | null;
  /** permanent-tide label as stated; null if none stands there */
  readonly tide: TideSystem | null;
  /** terrestrial reference frame of a height, epoch in decimal years, vertical rate in m/s, positive upwards */
  readonly frame?: string;
  readonly epochYear?: number;
  readonly rate?: Measured;
  /** source named at a value without uncertainty: of the error that b or k of a levelling line sizes, or of the line's k·d at dH */
  readonly source?: string;
  /** the grid off which the value was read */
  readonly grid?: GridUse;
  /** the value as typed, for messages; null for a bare number */
  readonly text: string | null;
}

export interface TimeInterval extends Remarks {
  /** milliseconds since 1970-01-01T00:00:00Z (UTC without leap seconds, as in ISO 8601 arithmetic) */
  readonly startMs: number;
  readonly endMs: number;
}

export interface Source extends Remarks {
  readonly id: string;
  readonly name?: string;
  /** correlation between different sites; exclusive with correlationLengthM */
  readonly correlation?: number;
  readonly correlationLengthM?: number;
}

export interface Datum extends Remarks {
  readonly id: string;
  readonly name?: string;
  readonly W0: Measured;
  /** benchmark that carries the datum */
  readonly origin: (Remarks & { readonly latitudeRad: Radians; readonly longitudeRad: Radians | null }) | null;
  readonly estimateOffset: boolean;
  readonly estimateTilt: boolean;
  readonly frame?: string;
  readonly epochYear?: number;
}

export interface Transition extends Remarks {
  readonly id: string;
  /** true over recommended frequency − 1; null if not stated */
  readonly offset: Measured | null;
  /** Hz, only for a transition that is not in the recommended list */
  readonly frequency: Measured | null;
}

interface DeterminationCommon extends Remarks {
  /** compared with the result, not fitted */
  readonly check: boolean;
  readonly candidate: boolean;
  readonly cost: number | null;
}

/** Where a value was read off a (quasi)geoid grid. */
export interface GridUse {
  readonly file: string;
  readonly method: InterpolationMethod;
  /** the nodes round the site, kept in the campaign in place of the file; null if the file itself is needed */
  readonly nodes: GridExcerpt | null;
}

/** The file of a gravity model, and how much of it is used. */
export interface GravityModelUse extends Remarks {
  readonly file: string;
  /** null: all of it */
  readonly maxDegree: number | null;
  /** permanent-tide system of the coefficients, where the file does not say; null if not stated */
  readonly tide: TideSystem | null;
}

/** A gravity model's potential at a marker, worked out from the file when the campaign was read. */
export interface GravityModelPotential {
  /** degree to which the series was summed */
  readonly maxDegree: number;
  /** ellipsoidal height at which it was summed, m, in the campaign's tide system */
  readonly heightM: number;
  /** W there, m²/s², in the campaign's tide system */
  readonly potentialM2s2: number;
  /** ∂W/∂h, m/s², negative */
  readonly perHeightMs2: number;
  /** standard uncertainty from the coefficients, and from what lies beyond the last degree, m²/s² */
  readonly commissionM2s2: number;
  readonly omissionM2s2: number;
}

/** How the errors of one model's coefficients go together between sites. */
export interface GravityModelCorrelation {
  readonly file: string;
  /** ids of the sites, in the order of the matrix */
  readonly sites: readonly string[];
  /** correlation matrix of the commission errors */
  readonly correlation: readonly (readonly number[])[];
}

export type Determination = DeterminationCommon &
  (
    | { readonly kind: 'potential'; readonly W: Measured }
    | { readonly kind: 'geopotential-number'; readonly C: Measured; readonly datum: string }
    | { readonly kind: 'normal-height'; readonly H: Measured; readonly datum: string; readonly field?: string }
    | { readonly kind: 'normal-orthometric-height'; readonly H: Measured; readonly datum: string }
    | {
        readonly kind: 'orthometric-height';
        readonly H: Measured;
        readonly g: Measured | null;
        readonly datum: string;
      }
    | {
        readonly kind: 'dynamic-height';
        readonly H: Measured;
        readonly gammaRef: Measured | null;
        readonly datum: string;
      }
    | {
        readonly kind: 'gnss-quasigeoid';
        readonly h: Measured | null;
        readonly zeta: Measured;
        readonly datum: string;
      }
    | {
        readonly kind: 'gnss-geoid';
        readonly h: Measured | null;
        readonly N: Measured;
        readonly g: Measured | null;
        readonly meanGravityFactor: Measured | null;
        readonly datum: string;
      }
    | {
        readonly kind: 'levelled-from';
        readonly site: string;
        readonly dH: Measured;
        readonly g: Measured | null;
        /** levelled distance (m), random (m^½) and systematic (1) error of the line, if u(dH) is to come from them */
        readonly lengthM?: number;
        readonly b?: Measured;
        readonly k?: Measured;
      }
    | {
        readonly kind: 'gravity-model';
        readonly h: Measured | null;
        readonly model: GravityModelUse;
        /** standard uncertainties as geoid heights, m, where stated in place of those from the file and Kaula's rule */
        readonly commissionM: number | null;
        readonly omissionM: number | null;
        readonly atMarker: GravityModelPotential;
      }
  );

export type DeterminationKind = Determination['kind'];

/** A place as its user states it, in coordinates of another system; latitude and longitude come from it. */
export interface SitePosition extends Remarks, StatedPosition {}

export interface Site extends Remarks {
  readonly id: string;
  readonly name?: string;
  /** geodetic, north positive, −π/2…π/2 */
  readonly latitudeRad: Radians;
  /** geodetic, east positive */
  readonly longitudeRad: Radians;
  /** what latitude and longitude were computed from; absent where they were stated */
  readonly position?: SitePosition;
  readonly h: Measured | null;
  /** gravity at the marker */
  readonly g: Measured | null;
  /** decrease of gravity with height, s⁻² */
  readonly gradient: Measured | null;
  /** loading, groundwater, air: added to W of the site's clocks, m²/s² */
  readonly variable: Measured | null;
  /** load of the ocean tide as felt at the site, by constituent; an empty list states that there is none */
  readonly oceanLoading?: readonly (Remarks & OceanLoadingConstituent)[];
  readonly determinations: readonly Determination[];
  readonly candidate: boolean;
  readonly cost: number | null;
}

export interface TieStep extends Remarks {
  readonly name?: string;
  /** height of the upper end over the lower, m; negative goes down */
  readonly dH: Measured;
}

/** Allan deviations: white and phase at 1 s, flicker the floor. */
export interface Stability extends Remarks {
  readonly white: number;
  readonly flicker: number;
  readonly phase: number;
}

interface Instrument extends Remarks {
  readonly id: string;
  readonly name?: string;
  /** pieces of the systematic relative frequency uncertainty */
  readonly systematic: readonly (UncertaintyPart & { readonly dof: number | null; readonly name?: string })[];
  readonly stability: Stability;
  /** share of the time in 0…1. Where `available` is stated: the share of the window that the intervals cover, without a window
   *  the share of their own span */
  readonly uptime: number;
  /** measured intervals as stated, in any order; null where none are stated */
  readonly available: readonly TimeInterval[] | null;
  readonly candidate: boolean;
  readonly cost: number | null;
}

/** An oscillator beside a clock that runs without gaps and carries its frequency while the clock does not run. */
export interface Flywheel extends Remarks, FlywheelNoise {
  /** length of the cycle at whose beginning a clock with a stated uptime runs, s; null where `available` says when it runs */
  readonly cycleS: number | null;
}

export interface Clock extends Instrument {
  readonly site: string;
  readonly transition: string;
  readonly tie: readonly TieStep[];
  readonly flywheel?: Flywheel;
}

/** The noise of a fibre, from which the phase noise of its link follows. */
export interface LinkFibre extends Remarks, FibreNoise {
  /** no length was stated: it is that of the geodesic between the sites */
  readonly lengthIsGeodesic: boolean;
}

/** The two clocks of a link compared in one place: that of the clock that stays. */
export interface SideBySide extends Remarks {
  readonly when: 'before' | 'after';
  /** offset of `to` seen from `from`, gravity's part left in; null where it is only planned */
  readonly y: Measured | null;
  /** time of data planned for it, s; null where y is stated */
  readonly timeS: number | null;
  /** height of the atoms of `to` over those of `from`, m */
  readonly dH: Measured;
  /** pieces of the travelling clock's systematic in that place; null: those of the clock */
  readonly systematic: Instrument['systematic'] | null;
  readonly startMs: number | null;
  readonly endMs: number | null;
}

/** One clock of a link travels: its frequency is compared in one place before and after. */
export interface TransportedClock extends Remarks {
  /** id of the clock that travels: one end of the link */
  readonly clock: string;
  /** standard uncertainty of what setting it up anew changes, relative frequency: once in every place and time */
  readonly reproducibility: number;
  readonly sideBySide: readonly SideBySide[];
}

/** A point that a signal or a moved clock passes. */
export interface RoutePoint extends Remarks {
  readonly latitudeRad: Radians;
  readonly longitudeRad: Radians;
  /** above sea level, or of a satellite, m */
  readonly heightM: number;
  readonly timeMs: number | null;
}

/** The way between the two clocks of a link. */
export interface Route extends Remarks {
  readonly via: readonly RoutePoint[];
  /** when a moved clock leaves and arrives; null for a signal */
  readonly departureMs: number | null;
  readonly arrivalMs: number | null;
}

export interface Link extends Instrument {
  /** clock ids; y is the offset of `to` seen from `from` */
  readonly from: string;
  readonly to: string;
  readonly kind: string | null;
  readonly lengthM: number | null;
  /** unbroken stretches of the link */
  readonly segments: number;
  readonly route?: Route;
  readonly fibre?: LinkFibre;
  readonly transported?: TransportedClock;
}

/** The file of frequency data that a y is the mean of, and what its reduction left out. */
export interface SeriesUse extends Remarks {
  readonly file: string;
  /** words of its columns, as stated */
  readonly columns?: string;
  /** sampling interval as stated, s */
  readonly tauS?: number;
  /** there once the campaign has been read */
  readonly reduced?: SeriesReduction;
}

/** How a series became its mean. */
export interface SeriesReduction {
  /** how u of the mean was come by, and that in words */
  readonly basis: MeanBasis;
  readonly words: string;
  /** samples used, and left out for lying outside the validity */
  readonly samples: number;
  readonly outside: number;
  /** time of the samples used; what is missing between the first and the last */
  readonly validS: number;
  readonly deadS: number;
  /** mean of the tide that was taken off; null for a file without dates */
  readonly tideMean: number | null;
}

export interface Measurement extends Remarks {
  readonly id: string | null;
  readonly link: string;
  /** as stated, or the mean of `series` in mean tide */
  readonly y: Measured;
  readonly series?: SeriesUse;
  readonly includesSystematic: boolean;
  readonly check: boolean;
  readonly startMs: number | null;
  readonly endMs: number | null;
}

export interface MeasurementCorrelation extends Remarks {
  /** measurement ids */
  readonly between: readonly [string, string];
  readonly rho: number;
}

/** What levelling and GNSS with a (quasi)geoid would do over any distance, for comparison with the clocks. */
export interface ClassicalMethods extends Remarks {
  readonly levelling: LevellingModel | null;
  readonly gnss: GnssModel | null;
}

/** u = b·√(detour·d) ⊕ k·detour·d over the distance d. */
export interface LevellingModel extends Remarks {
  /** m^½ */
  readonly bRootM: number;
  /** m/m */
  readonly k: number;
  /** length of the line over the distance, ≥ 1 */
  readonly detour: number;
}

/** u² = 2·(h² + geoid²·(1 − ρ(d))): heights independent, (quasi)geoid correlated over the distance d. */
export interface GnssModel extends Remarks {
  /** standard uncertainty of an ellipsoidal height, m */
  readonly hM: number;
  /** standard uncertainty of a (quasi)geoid height, m */
  readonly geoidM: number;
  /** ρ = exp(−d/L); null: `correlation` at any distance */
  readonly correlationLengthM: number | null;
  readonly correlation: number;
}

/** A validated campaign: everything in SI and radians, ids resolved, immutable. */
export interface Campaign extends Remarks {
  readonly format: 'plumbtick-campaign/1';
  readonly title?: string;
  readonly tide: TideSystem;
  readonly window: TimeInterval | null;
  /** wanted standard uncertainty, as length equivalent, m */
  readonly targetM: number | null;
  /** discrepancy to be revealed, as length equivalent, m; null: 10 × target */
  readonly effectM: number | null;
  readonly love: Remarks & { readonly h2: number; readonly k2: number };
  /** coordinates of the pole in order of time, or one position for all times */
  readonly pole?: readonly (Remarks & PolePosition)[];
  /** decimal year at which the potentials are wanted; heights with a rate are brought to it */
  readonly epochYear?: number;
  readonly sources: readonly Source[];
  readonly datums: readonly Datum[];
  readonly transitions: readonly Transition[];
  readonly sites: readonly Site[];
  readonly clocks: readonly Clock[];
  readonly links: readonly Link[];
  readonly measurements: readonly Measurement[];
  /** one per gravity model whose file gives standard deviations; none if absent */
  readonly gravityModels?: readonly GravityModelCorrelation[];
  readonly correlations: readonly MeasurementCorrelation[];
  readonly methods?: ClassicalMethods;
}
