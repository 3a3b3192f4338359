import type { Campaign, Datum, Measured, Site } from '../campaign/campaign.js';
import { CampaignError, faultAt, type Warning } from '../campaign/fault.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { FRAME_NAMES, type FrameName, readFrameName } from '../earth/frames/frame-name.js';
import { frameChangeOfHeight, heightInFrame } from '../earth/frames/height-in-frame.js';
import { normalOrthometricShortfallM2s2 } from '../earth/normal-orthometric-height.js';
import { radToDeg } from '../quantity/radians.js';
import { offsetSizeText, sizeText } from '../quantity/size.js';

const YEAR_S = 31_557_600;
const J2000_MS = 946_728_000_000;
const ROUND_GRAVITY_MS2 = 9.81;

/** What the epoch and the frame do to a stated height: a constant, and the years over which its rate acts. */
export interface HeightReduction {
  /** by the change of frame, m */
  readonly shiftM: number;
  /** ∂(height)/∂(rate): seconds from the height's epoch to the one wanted; 0 without a rate */
  readonly motionS: number;
}

const UNCHANGED: HeightReduction = { shiftM: 0, motionS: 0 };

/** Brings stated heights to the frame and the epoch of the surface they are used with, and says what it did, in mm.
 *
 *  The epoch wanted is the campaign's, if it states one; else that of the geoid or datum; else, for a height with a rate, the
 *  middle of the window, when the clocks run. A height without a rate is not moved. A frame is changed only if both sides name
 *  theirs; where one of them does not, a warning says what that may cost. */
export class HeightReductions {
  readonly warnings: Warning[] = [];
  readonly #campaign: Campaign;
  readonly #seen = new Set<string>();

  constructor(campaign: Campaign) {
    this.#campaign = campaign;
  }

  /** For an ellipsoidal height h used with ζ or N of a model (`surface`, null for a global model of the potential). */
  ellipsoidal(
    h: Measured,
    path: string,
    site: Site,
    surface: Measured | null,
    datumId: string | null,
  ): HeightReduction {
    const datum = this.#datum(datumId);
    const to = frameOf(surface?.frame ?? datum?.frame);
    const from = frameOf(h.frame);
    const epoch = this.#targetEpoch(h, surface?.epochYear ?? datum?.epochYear ?? null);
    const motionS = this.#motion(h, path, epoch);
    if (from === null || to === null) {
      if (from !== null || to !== null) this.#warnOneFrame(h, path, site, from, to, epoch);
      return { shiftM: 0, motionS };
    }
    if (from === to) return { shiftM: 0, motionS };
    const at = epoch ?? h.epochYear;
    if (at === undefined || at === null)
      throw new CampaignError([
        faultAt(
          'missing',
          `${path}.epoch`,
          `${from} without an epoch`,
          `"epoch": the decimal year of the height, for ${from} and ${to} drift against each other`,
        ),
      ]);
    // without a rate the height stands at its own epoch, and there the frames are compared
    const used = h.rate === undefined ? (h.epochYear ?? at) : at;
    const shiftM = frameChangeOfHeight(site.latitudeRad, site.longitudeRad, h.value, from, to, used);
    const { sources } = heightInFrame(
      site.latitudeRad,
      site.longitudeRad,
      h.value,
      0,
      { frame: from, epochYear: used },
      { frame: to, epochYear: used },
    );
    this.#warn(
      'frame-converted',
      path,
      `h is in ${from}, the geoid in ${to}: ${signedMm(shiftM)} added at epoch ${yearText(used)} (${offsetOf(shiftM)} if it were forgotten). ${sources.join('; ')}.`,
    );
    return { shiftM, motionS };
  }

  /** For a height above a datum (H), whose benchmarks have an epoch. */
  physical(H: Measured, path: string, datumId: string): HeightReduction {
    const epoch = this.#targetEpoch(H, this.#datum(datumId)?.epochYear ?? null);
    return { ...UNCHANGED, motionS: this.#motion(H, path, epoch) };
  }

  /** For ζ or N: a geoid that moves. */
  surface(measured: Measured, path: string): HeightReduction {
    const epoch = this.#targetEpoch(measured, null);
    return { ...UNCHANGED, motionS: this.#motion(measured, path, epoch) };
  }

  /** No measured gravity is in a normal-orthometric height: says how much that may be. */
  noteNormalOrthometric(H: Measured, path: string, site: Site): void {
    const size = normalOrthometricShortfallM2s2(site.latitudeRad, H.value, site.g?.value ?? null);
    const anomaly = site.g ? 'the gravity anomaly at the site' : 'a gravity anomaly of 50 mGal and 50 mGal for each km';
    this.#warn(
      'normal-orthometric',
      path,
      `no measured gravity is in a normal-orthometric height; it is taken for a normal height. With ${anomaly} W may be off by ${sizeText(size)} m²/s² (${offsetSizeText(size / SPEED_OF_LIGHT_SQUARED_M2_PER_S2)}), which is not in u. Levelling with gravity, or a GNSS height with a quasigeoid, has no such error.`,
    );
  }

  #datum(id: string | null): Datum | undefined {
    return this.#campaign.datums.find((d) => d.id === id);
  }

  #targetEpoch(height: Measured, surfaceEpoch: number | null): number | null {
    const stated = this.#campaign.epochYear ?? surfaceEpoch;
    if (stated !== null) return stated;
    return height.rate === undefined ? null : this.#middleOfWindow();
  }

  #middleOfWindow(): number | null {
    const { window } = this.#campaign;
    return window ? 2000 + ((window.startMs + window.endMs) / 2 - J2000_MS) / (1000 * YEAR_S) : null;
  }

  /** Seconds over which the rate acts, with a word on what it does. */
  #motion(height: Measured, path: string, epoch: number | null): number {
    const { rate, epochYear } = height;
    if (rate === undefined) {
      if (epoch !== null && epochYear !== undefined && Math.abs(epoch - epochYear) > 0.5)
        this.#warn(
          'epoch-without-rate',
          path,
          `the height is of epoch ${yearText(epochYear)}, wanted is ${yearText(epoch)}, and no rate is stated: it is not moved. Each 1 mm/a would be ${sizeText(Math.abs(epoch - epochYear))} mm. State "rate", 0 if the ground is at rest.`,
        );
      return 0;
    }
    if (epochYear === undefined)
      throw new CampaignError([
        faultAt(
          'missing',
          `${path}.epoch`,
          'a rate without an epoch',
          '"epoch": the decimal year at which the height holds',
        ),
      ]);
    if (epoch === null) return 0;
    const seconds = (epoch - epochYear) * YEAR_S;
    const moved = rate.value * seconds;
    if (Math.abs(moved) >= 5e-5)
      this.#warn(
        'epoch-converted',
        path,
        `moved from epoch ${yearText(epochYear)} to ${yearText(epoch)} by its rate: ${signedMm(moved)} (${offsetOf(moved)}).`,
      );
    const middle = this.#middleOfWindow();
    const late = middle === null ? 0 : rate.value * (middle - epoch) * YEAR_S;
    if (middle !== null && Math.abs(late) >= 5e-4)
      this.#warn(
        'epoch-not-of-window',
        path,
        `W is that of epoch ${yearText(epoch)}; by the middle of the window, ${yearText(middle)}, the site will have moved by ${signedMm(late)} more (${offsetOf(late)}). State "epoch": ${middle.toFixed(2)} for the campaign to have W of that time.`,
      );
    return seconds;
  }

  #warnOneFrame(
    h: Measured,
    path: string,
    site: Site,
    from: FrameName | null,
    to: FrameName | null,
    epoch: number | null,
  ): void {
    const known = (from ?? to) as FrameName;
    const at = epoch ?? h.epochYear ?? this.#middleOfWindow() ?? 2020;
    const others = FRAME_NAMES.filter((f) => f !== known && (isInEurope(site) || !f.startsWith('ETRF')));
    const sizes = others.map((frame) => ({
      frame,
      m: frameChangeOfHeight(site.latitudeRad, site.longitudeRad, h.value, known, frame, at),
    }));
    const worst = sizes.reduce((a, b) => (Math.abs(b.m) > Math.abs(a.m) ? b : a));
    this.#warn(
      from === null ? 'height-frame-missing' : 'geoid-frame-missing',
      path,
      `${from === null ? `the geoid is in ${known}, the height states no frame` : `h is in ${known}, the geoid (or its datum) states no frame`}: taken as the same. If it is ${worst.frame}, h is off by ${sizeText(Math.abs(worst.m) * 1000)} mm (${offsetOf(worst.m)}).`,
    );
  }

  #warn(code: string, path: string, message: string): void {
    const key = `${code} ${path} ${message}`;
    if (this.#seen.has(key)) return;
    this.#seen.add(key);
    this.warnings.push({ code, path, message });
  }
}

/** The frame a text names; the reader has checked that it names one. */
function frameOf(text: string | undefined): FrameName | null {
  if (text === undefined) return null;
  const read = readFrameName(text);
  return read.ok ? read.frame : null;
}

/** Where ETRF frames are used, roughly. */
const isInEurope = ({ latitudeRad, longitudeRad }: Site): boolean => {
  const lat = radToDeg(latitudeRad);
  const lon = radToDeg(longitudeRad);
  return lat > 27 && lat < 82 && lon > -32 && lon < 46;
};

const yearText = (year: number): string => String(Number(year.toFixed(2)));
const signedMm = (metres: number): string => `${metres < 0 ? '\u2212' : '+'}${Math.abs(metres * 1000).toFixed(1)} mm`;
const offsetOf = (metres: number): string =>
  offsetSizeText((Math.abs(metres) * ROUND_GRAVITY_MS2) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2);
