import type { Point } from '../fixed-point/constellation';
import { edgeTail, normalDensity, tail } from '../math/gaussian-tail';
import { nearestIndex } from './decision-regions';
import type { DecisionRegions } from './decision-regions';

/** Borders farther than this many deviations from a sample decide nothing: 1e-9 of the samples reach so far. */
const reach = 6.3;

/**
 * What is told of a border by its index, lengths in deviations of the noise: its distance, positive on the side of
 * `near`; its two ends along its line from the foot of the perpendicular; and the share of P(near) that comes over it.
 */
export type TakeBorder = (border: number, distance: number, first: number, last: number, share: number) => void;

/** Calls back for every border near enough to matter; returns the index of the region in which the mean lies. */
export function eachBorder(regions: DecisionRegions, deviation: number, [i, q]: Point, take: TakeBorder): number {
  const { points, near, far, normalI, normalQ, offset, from, to } = regions;
  const home = nearestIndex(points, i, q);
  const scale = 1 / deviation;
  for (let k = 0; k < offset.length; k += 1) {
    const distance = (normalI[k]! * i + normalQ[k]! * q - offset[k]!) * scale;
    if (distance > reach || distance < -reach) continue;
    const along = normalI[k]! * q - normalQ[k]! * i;
    const first = (from[k]! - along) * scale;
    const last = (to[k]! - along) * scale;
    // The border's nearest point may be one of its ends.
    const past = first > 0 ? first : last < 0 ? last : 0;
    if (past * past + distance * distance > reach * reach) continue;
    // Rounding must not put a mean on one side of its own region's border and into the other region.
    const side = home === near[k] ? 1 : home === far[k] ? -1 : Math.sign(distance);
    take(k, distance, first, last, -side * hidden(Math.abs(distance), first, last));
  }
  return home;
}

/** Share of the noise beyond a border at a distance, between its two ends, all in deviations. */
export function hidden(distance: number, first: number, last: number): number {
  // On the border itself the angle is half a turn where the border passes, and none elsewhere.
  if (distance === 0) return first < 0 && last > 0 ? 0.5 : 0;
  return edgeTail(distance, first / distance, last / distance);
}

/** Density of the noise on a border as a line integral, per deviation: what P(near) gains by a step along n. */
export const borderDensity = (distance: number, first: number, last: number): number =>
  normalDensity(distance) * (tail(first) - tail(last));

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
  const { near, far } = regions;
  let [meanI, meanQ] = [0, 0];
  const home = eachBorder(regions, deviation, m, (k, _distance, _first, _last, share) => {
    meanI += share * (decided[near[k]!]![0] - decided[far[k]!]![0]);
    meanQ += share * (decided[near[k]!]![1] - decided[far[k]!]![1]);
  });
  return [decided[home]![0] + meanI, decided[home]![1] + meanQ];
}
