/** Places of a network drawing in px: sites by position, nothing to scale but their directions and distances. */
export interface NetworkPlan {
  readonly width: number;
  readonly height: number;
  readonly at: ReadonlyMap<string, readonly [x: number, y: number]>;
}

/** Room round the sites for stems and labels, px. */
const MARGIN = { left: 84, right: 96, top: 44, bottom: 96 };
const NARROW_MARGIN = { left: 44, right: 64, top: 36, bottom: 70 };

/** Maps positions (degrees) to a plate of that width: north up, east right, one scale for both ways. */
export function networkPlan(
  sites: readonly { readonly id: string; readonly latitudeRad: number; readonly longitudeRad: number }[],
  width: number,
): NetworkPlan {
  const margin = width < 656 ? NARROW_MARGIN : MARGIN;
  const latitudes = sites.map((s) => s.latitudeRad);
  const middle = (Math.min(...latitudes) + Math.max(...latitudes)) / 2;
  const xs = sites.map((s) => s.longitudeRad * Math.cos(middle));
  const [west, east] = [Math.min(...xs), Math.max(...xs)];
  const [south, north] = [Math.min(...latitudes), Math.max(...latitudes)];
  const across = Math.max(1, width - margin.left - margin.right);
  const tallest = Math.min(across * 0.75, 420);
  const scale = Math.min(across / Math.max(east - west, 1e-9), tallest / Math.max(north - south, 1e-9));
  const used = { x: (east - west) * scale, y: (north - south) * scale };
  const left = margin.left + (across - used.x) / 2;
  return {
    width,
    height: Math.round(used.y + margin.top + margin.bottom),
    at: new Map(
      sites.map((s, i) => [
        s.id,
        [Math.round(left + (xs[i]! - west) * scale), Math.round(margin.top + (north - s.latitudeRad) * scale)] as const,
      ]),
    ),
  };
}

/** Weight of a line by how well it is controlled, px: 0.5 + 4 × control. */
export const controlWeight = (control: number): number => 0.5 + 4 * control;

/** A line bent aside so that several between the same sites stay apart. @param lane 0 straight, then ±1, ±2 … */
export function bentLine(
  a: readonly [number, number],
  b: readonly [number, number],
  lane: number,
): { readonly d: string; readonly middle: readonly [number, number] } {
  const [dx, dy] = [b[0] - a[0], b[1] - a[1]];
  const length = Math.hypot(dx, dy) || 1;
  const bend = lane * Math.min(36, length / 4);
  const control = [(a[0] + b[0]) / 2 - (dy / length) * bend * 2, (a[1] + b[1]) / 2 + (dx / length) * bend * 2] as const;
  const middle = [(a[0] + b[0]) / 4 + control[0] / 2, (a[1] + b[1]) / 4 + control[1] / 2] as const;
  const d =
    lane === 0
      ? `M${a[0]} ${a[1]}L${b[0]} ${b[1]}`
      : `M${a[0]} ${a[1]}Q${control[0].toFixed(1)} ${control[1].toFixed(1)} ${b[0]} ${b[1]}`;
  return { d, middle };
}

/** Lanes for lines between the same pair of sites: 0, 1, −1, 2 … in their order. */
export function lanes(pairs: readonly (readonly [string, string])[]): number[] {
  const seen = new Map<string, number>();
  return pairs.map(([a, b]) => {
    const key = a < b ? `${a} ${b}` : `${b} ${a}`;
    const n = seen.get(key) ?? 0;
    seen.set(key, n + 1);
    const lane = n === 0 ? 0 : n % 2 === 1 ? (n + 1) / 2 : -n / 2;
    // a line walked the other way would bend to the other side
    return a < b ? lane : -lane;
  });
}
