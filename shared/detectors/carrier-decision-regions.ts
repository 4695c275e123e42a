import type { Point } from '../fixed-point/constellation';
import { normalDensity } from '../math/gaussian-tail';
import { borderDensity, decidedMean, eachBorder } from './decided-mean';
import type { SeenBorder } from './decided-mean';
import type { DecisionRegions } from './decision-regions';

export interface RegionDecision {
  /** Regions and points of the decision, unit power. */
  regions: DecisionRegions;
  /** What is decided in each region. */
  decided: readonly Point[];
  /** One of each set of points that whole M-ths of a turn map onto one another. */
  sent: readonly Point[];
  /** Noise deviation of one rail where E|a|² = 1. */
  deviation: number;
}

const mean = (points: readonly Point[], value: (point: Point) => number): number =>
  points.reduce((sum, point) => sum + value(point), 0) / points.length;

const turned = ([i, q]: Point, cos: number, sin: number): Point => [i * cos - q * sin, i * sin + q * cos];

/**
 * Mean of Im(z · conj â) at a static phase x: the mean over the symbols of Im(m · conj f(m)), m = a e^(jx) and f the
 * mean decided point. Noise and decision are correlated only along p_near − p_far, which is the border's normal, so
 * what the noise adds, σ² times the change of f̄ along it, has no imaginary part.
 */
export function regionCurve({ regions, decided, sent, deviation }: RegionDecision, x: number): number {
  const [cos, sin] = [Math.cos(x), Math.sin(x)];
  return mean(sent, (a) => {
    const m = turned(a, cos, sin);
    const f = decidedMean(regions, deviation, decided, m);
    return m[1] * f[0] - m[0] * f[1];
  });
}

/** Slope of that curve at lock: E[Re(a · conj f) + Im(a · conj f′)], f′ the change of f as the sample turns. */
export function regionSlope({ regions, decided, sent, deviation }: RegionDecision): number {
  return mean(sent, (a) => {
    let slope = 0;
    let [fI, fQ] = [0, 0];
    const home = eachBorder(regions, deviation, a, (seen) => {
      const { near, far, normal } = seen.border;
      const [stepI, stepQ] = [decided[near]![0] - decided[far]![0], decided[near]![1] - decided[far]![1]];
      fI += seen.share * stepI;
      fQ += seen.share * stepQ;
      const along = (normal[1] * a[0] - normal[0] * a[1]) * borderDensity(seen, deviation);
      slope += along * (a[1] * stepI - a[0] * stepQ);
    });
    fI += decided[home]![0];
    fQ += decided[home]![1];
    return a[0] * fI + a[1] * fQ + slope;
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
    const level = (v: Point): number => dot(v, m) ** 2 + (deviation * Math.hypot(...v)) ** 2;
    let sum = 0;
    const home = eachBorder(regions, deviation, m, (seen) => {
      const [near, far] = [across[seen.border.near]!, across[seen.border.far]!];
      sum += seen.share * (level(near) - level(far));
      sum += borderMoment(seen, near, m, deviation) - borderMoment(seen, far, m, deviation);
    });
    return sum + level(across[home]!);
  });
}

const dot = (a: Point, b: Point): number => a[0] * b[0] + a[1] * b[1];

/** What a border adds to (v·z)² on its near side: 2σ²(v·m)(v·∇P) + σ⁴ vᵀ∇∇P v. */
function borderMoment(seen: SeenBorder, v: Point, m: Point, deviation: number): number {
  const { border, distance, first, last } = seen;
  const density = borderDensity(seen, deviation);
  const inward = dot(v, border.normal);
  const along = border.normal[0] * v[1] - border.normal[1] * v[0];
  const steepness = -(distance / deviation) * density;
  const drift = (normalDensity(distance) * (normalDensity(first) - normalDensity(last))) / deviation ** 2;
  const variance = deviation ** 2;
  return inward * (2 * variance * dot(v, m) * density + variance ** 2 * (inward * steepness + along * drift));
}
