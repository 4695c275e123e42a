import type { Point } from '../fixed-point/constellation';
import { edgeTail, normalDensity, tail } from '../math/gaussian-tail';
import { nearestIndex } from './decision-regions';
import type { Border, DecisionRegions } from './decision-regions';

/** Borders farther than this many deviations from a sample decide nothing: 2e-11 of the samples reach so far. */
const reach = 6.7;

/** One border as a sample of a given mean sees it, lengths in deviations of the noise. */
export interface SeenBorder {
  border: Border;
  /** Distance from the border's line, positive on the side of `near`. */
  distance: number;
  /** The border's ends along its line, from the foot of the perpendicular. */
  first: number;
  last: number;
  /** Change of P(near) by this border alone: minus what it lets over from its near side, or what it lets in. */
  share: number;
}

/** Calls back for every border near enough to matter; returns the index of the region in which the mean lies. */
export function eachBorder(
  { points, borders }: DecisionRegions,
  deviation: number,
  [i, q]: Point,
  take: (seen: SeenBorder) => void,
): number {
  const home = nearestIndex(points, i, q);
  for (let k = 0; k < borders.length; k += 1) {
    const border = borders[k]!;
    const { normal, offset, from, to } = border;
    const distance = (normal[0] * i + normal[1] * q - offset) / deviation;
    if (distance > reach || distance < -reach) continue;
    const along = normal[0] * q - normal[1] * i;
    const [first, last] = [(from - along) / deviation, (to - along) / deviation];
    if (first > reach || last < -reach) continue;
    const share = -sideOf(border, home, distance) * hidden(Math.abs(distance), first, last);
    take({ border, distance, first, last, share });
  }
  return home;
}

/** +1 on the side of `near`. Rounding must not put a mean on one side here and into the other's region there. */
function sideOf({ near, far }: Border, home: number, distance: number): number {
  if (home === near) return 1;
  if (home === far) return -1;
  return Math.sign(distance);
}

/** Share of the noise beyond a border at a distance, between its two ends, all in deviations. */
export function hidden(distance: number, first: number, last: number): number {
  // On the border itself the angle is half a turn where the border passes, and none elsewhere.
  if (distance === 0) return first < 0 && last > 0 ? 0.5 : 0;
  return edgeTail(distance, first / distance, last / distance);
}

/** Density of the noise on a border as a line integral, per unit of distance: what P(near) gains by a step along n. */
export const borderDensity = ({ distance, first, last }: SeenBorder, deviation: number): number =>
  (normalDensity(distance) * (tail(first) - tail(last))) / deviation;

/**
 * Mean of the decided point over the noise for a sample of mean m: the nearest point, changed by what each border lets
 * over to its other side,
 *
 *     f(m) = p(m) − Σ ±(p_near − p_far) · 1/(2π) ∫ exp(−r²/2σ²) dα    over the angle α that the border fills from m,
 *
 * which is the divergence theorem on the Gaussian in polar coordinates round m.
 *
 * @param deviation σ of the noise of one rail, in the unit of the points, above 0
 * @param decided what is decided for each point
 */
export function decidedMean(regions: DecisionRegions, deviation: number, decided: readonly Point[], m: Point): Point {
  let [meanI, meanQ] = [0, 0];
  const home = eachBorder(regions, deviation, m, ({ border: { near, far }, share }) => {
    meanI += share * (decided[near]![0] - decided[far]![0]);
    meanQ += share * (decided[near]![1] - decided[far]![1]);
  });
  return [decided[home]![0] + meanI, decided[home]![1] + meanQ];
}
