import type { Point } from '../fixed-point/constellation';

/**
 * The borders between the regions in which each point of a list is the nearest. A border is a stretch of the line
 * n·z = offset, from `from` to `to` along the line's direction (−nQ, nI); either may be infinite.
 */
export interface DecisionRegions {
  points: readonly Point[];
  borders: readonly Border[];
}

export interface Border {
  /** Indices of the points on either side; n goes from `far` to `near`. */
  near: number;
  far: number;
  normal: Point;
  offset: number;
  from: number;
  to: number;
}

/** Borders shorter than this are corners in which more than three regions meet. */
const shortest = 1e-9;

export function decisionRegions(points: readonly Point[]): DecisionRegions {
  const borders: Border[] = [];
  for (let near = 0; near < points.length; near += 1) {
    for (let far = near + 1; far < points.length; far += 1) {
      const border = borderBetween(points, near, far);
      if (border.to - border.from > shortest) borders.push(border);
    }
  }
  return { points, borders };
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
    // |z − p|² < |z − other|² along z = offset·n + t·(−nQ, nI) is a·t < b.
    const a = 2 * (-(i - nearI) * normal[1] + (q - nearQ) * normal[0]);
    const b =
      i ** 2 + q ** 2 - nearI ** 2 - nearQ ** 2 - 2 * offset * ((i - nearI) * normal[0] + (q - nearQ) * normal[1]);
    if (Math.abs(a) < 1e-12) {
      if (b < -1e-12) to = -Infinity;
    } else if (a > 0) to = Math.min(to, b / a);
    else from = Math.max(from, b / a);
  });
  return { near, far, normal, offset, from, to };
}

/** The nearest point of a list, by index. */
export function nearestIndex(points: readonly Point[], i: number, q: number): number {
  let least = Infinity;
  let index = 0;
  for (let k = 0; k < points.length; k += 1) {
    const [pI, pQ] = points[k]!;
    const distance = (i - pI) ** 2 + (q - pQ) ** 2;
    if (distance < least) [least, index] = [distance, k];
  }
  return index;
}

/** The same regions seen from the origin `stretch` times as far away, points and all. */
export const stretchedRegions = ({ points, borders }: DecisionRegions, stretch: number): DecisionRegions => ({
  points: points.map(([i, q]): Point => [stretch * i, stretch * q]),
  borders: borders.map((border) => ({
    ...border,
    offset: stretch * border.offset,
    from: stretch * border.from,
    to: stretch * border.to,
  })),
});
