import type { Point } from '../fixed-point/constellation';
import { normalDensity } from '../math/gaussian-tail';
import { borderDensity, decidedMean, eachBorder } from './decided-mean';
import { nearestIndex } from './decision-regions';
import type { DecisionRegions } from './decision-regions';

export interface RegionDecision {
  /** Regions of the decision, in the unit in which E|a|² = 1. */
  regions: DecisionRegions;
  /** What is decided in each region. */
  decided: readonly Point[];
  /** One of each set of points that whole M-ths of a turn map onto one another. */
  sent: readonly Point[];
  /** Noise deviation of one rail. */
  deviation: number;
}

const mean = (points: readonly Point[], value: (point: Point) => number): number =>
  points.reduce((sum, point) => sum + value(point), 0) / points.length;

/** Im(z · conj â) of two points. */
const cross = ([i, q]: Point, [decidedI, decidedQ]: Point): number => q * decidedI - i * decidedQ;

/** Mean over the symbols of a value at their points turned by an angle. */
function meanTurned(sent: readonly Point[], x: number, value: (m: Point) => number): number {
  const [cos, sin] = [Math.cos(x), Math.sin(x)];
  return mean(sent, ([i, q]) => value([i * cos - q * sin, i * sin + q * cos]));
}

/**
 * Mean of Im(z · conj â) at a static phase x: the mean over the symbols of Im(m · conj f(m)), m = a e^(jx) and f the
 * mean decided point. Noise and decision are correlated only along p_near − p_far, which is the border's normal, so
 * what the noise adds, σ² times the change of f̄ along it, has no imaginary part.
 */
export const regionCurve = ({ regions, decided, sent, deviation }: RegionDecision, x: number): number =>
  meanTurned(sent, x, (m) => cross(m, decidedMean(regions, deviation, decided, m)));

/** The same without noise. */
export const noiselessCurve = ({ regions, decided, sent }: Omit<RegionDecision, 'deviation'>, x: number): number =>
  meanTurned(sent, x, (m) => cross(m, decided[nearestIndex(regions.points, m[0], m[1])]!));

/** Slope of the curve with noise at lock: E[Re(a · conj f) + Im(a · conj f′)], f′ the change of f as the sample turns. */
export function regionSlope({ regions, decided, sent, deviation }: RegionDecision): number {
  const { near, far, normalI, normalQ } = regions;
  return mean(sent, (a) => {
    let sum = 0;
    const home = eachBorder(regions, deviation, a, (k, distance, first, last, share) => {
      const [nearI, nearQ] = decided[near[k]!]!;
      const [farI, farQ] = decided[far[k]!]!;
      const [stepI, stepQ] = [nearI - farI, nearQ - farQ];
      const crossing = normalQ[k]! * a[0] - normalI[k]! * a[1];
      sum += share * (a[0] * stepI + a[1] * stepQ);
      sum += (crossing * borderDensity(distance, first, last) * cross(a, [stepI, stepQ])) / deviation;
    });
    return sum + dot(a, decided[home]!);
  });
}

/**
 * Mean square of Im(z · conj â) at lock. With v ⊥ the decided point, it is Σ E[(v·z)²; region], and in each region
 * E[z zᵀ] follows from the probability P of the region and its first two derivatives by the mean m:
 *
 *     (m mᵀ + σ²I)·P + σ²(m ∇Pᵀ + ∇P mᵀ) + σ⁴ ∇∇P
 */
export function regionVariance({ regions, decided, sent, deviation }: RegionDecision): number {
  const across = decided.map(([i, q]): Point => [-q, i]);
  return mean(sent, (m) => {
    const level = (v: Point): number => dot(v, m) ** 2 + deviation ** 2 * dot(v, v);
    let sum = 0;
    const home = eachBorder(regions, deviation, m, (k, distance, first, last, share) => {
      const [near, far] = [across[regions.near[k]!]!, across[regions.far[k]!]!];
      const normal: Point = [regions.normalI[k]!, regions.normalQ[k]!];
      const density = borderDensity(distance, first, last);
      const drift = normalDensity(distance) * (normalDensity(first) - normalDensity(last));
      const moment = (v: Point): number => {
        const inward = dot(v, normal);
        // ∇P is the density along n; its own change is −distance times it along n, and the drift along the border.
        const curvature = -distance * density * inward + drift * cross(v, normal);
        return inward * (2 * deviation * dot(v, m) * density + deviation ** 2 * curvature);
      };
      sum += share * (level(near) - level(far)) + moment(near) - moment(far);
    });
    return sum + level(across[home]!);
  });
}

const dot = (a: Point, b: Point): number => a[0] * b[0] + a[1] * b[1];
