import type { Point } from '../fixed-point/constellation';
import { latest } from './latest';
import { pointsOf } from './modulations';
import type { Modulation } from './modulations';

/**
 * The borders between the regions in which each point of a list is the nearest, as columns: one entry a border. It is
 * the stretch of the line n·z = offset from `from` to `to` along the line's direction (−nQ, nI); either may be infinite.
 */
export interface DecisionRegions {
  points: readonly Point[];
  /** Indices of the points on either side; n goes from `far` to `near`. */
  near: Int32Array;
  far: Int32Array;
  normalI: Float64Array;
  normalQ: Float64Array;
  offset: Float64Array;
  from: Float64Array;
  to: Float64Array;
}

interface Border {
  near: number;
  far: number;
  normal: Point;
  offset: number;
  from: number;
  to: number;
}

/** Borders shorter than this are corners in which more than three regions meet. */
const shortest = 1e-9;

const kept = latest<DecisionRegions>(8);

/**
 * Regions of a modulation.
 *
 * @throws {ParameterError} pointing at the ring ratios when they do not fit
 */
export const regionsOf = (modulation: Modulation, ringRatios?: readonly number[]): DecisionRegions =>
  kept(`${modulation} ${ringRatios?.join() ?? ''}`, () => decisionRegions(pointsOf(modulation, ringRatios)));

function decisionRegions(points: readonly Point[]): DecisionRegions {
  const pairs = points.flatMap((_, near) => points.slice(near + 1).map((_each, k) => [near, near + 1 + k] as const));
  const borders = pairs
    .map(([near, far]) => borderBetween(points, near, far))
    .filter(({ from, to }) => to - from > shortest);
  const column = (value: (border: Border) => number) => Float64Array.from(borders, value);
  return {
    points,
    near: Int32Array.from(borders, ({ near }) => near),
    far: Int32Array.from(borders, ({ far }) => far),
    normalI: column(({ normal }) => normal[0]),
    normalQ: column(({ normal }) => normal[1]),
    offset: column(({ offset }) => offset),
    from: column(({ from }) => from),
    to: column(({ to }) => to),
  };
}

/** The perpendicular bisector of two points, cut to where no third point is nearer. */
function borderBetween(points: readonly Point[], near: number, far: number): Border {
  const [nearI, nearQ] = points[near]!;
  const [farI, farQ] = points[far]!;
  const length = Math.hypot(nearI - farI, nearQ - farQ);
  const normal: Point = [(nearI - farI) / length, (nearQ - farQ) / length];
  const offset = (nearI ** 2 + nearQ ** 2 - farI ** 2 - farQ ** 2) / (2 * length);
  let [from, to] = [-Infinity, Infinity];
  points.forEach(([i, q], other) => {
    if (other === near || other === far) return;
    const [stepI, stepQ] = [i - nearI, q - nearQ];
    // At offset·n + t·(−nQ, nI) the near point is nearer than the other one where steepness·t < level.
    const steepness = 2 * (stepQ * normal[0] - stepI * normal[1]);
    const level = i ** 2 + q ** 2 - nearI ** 2 - nearQ ** 2 - 2 * offset * (stepI * normal[0] + stepQ * normal[1]);
    if (Math.abs(steepness) < 1e-12) {
      if (level < -1e-12) to = -Infinity;
    } else if (steepness > 0) to = Math.min(to, level / steepness);
    else from = Math.max(from, level / steepness);
  });
  return { near, far, normal, offset, from, to };
}

/** The nearest point of a list, by index; the first of equally near ones. */
export function nearestIndex(points: readonly Point[], i: number, q: number): number {
  let least = Infinity;
  let index = 0;
  for (let k = 0; k < points.length; k += 1) {
    const point = points[k]!;
    const distance = (point[0] - i) * (point[0] - i) + (point[1] - q) * (point[1] - q);
    if (distance < least) {
      least = distance;
      index = k;
    }
  }
  return index;
}

/** The same regions from the origin `stretch` times as far away, points and all. */
export function stretchedRegions(regions: DecisionRegions, stretch: number): DecisionRegions {
  const stretched = (column: Float64Array) => column.map((value) => stretch * value);
  return {
    ...regions,
    points: regions.points.map(([i, q]): Point => [stretch * i, stretch * q]),
    offset: stretched(regions.offset),
    from: stretched(regions.from),
    to: stretched(regions.to),
  };
}
