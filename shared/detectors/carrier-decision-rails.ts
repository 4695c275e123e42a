import erf from '@stdlib/math-base-special-erf';
import { normalDensity } from '../math/gaussian-tail';

/** Square QAM whose rails are sliced one by one, E|a|² = 1. */
export interface RailDecision {
  /** Levels of one rail: 4 for 16QAM, 8 for 64QAM. */
  side: number;
  /** Noise deviation of one rail, 0 or more. */
  deviation: number;
  /** The thresholds stand this much farther out than half-way between the levels of the signal. */
  stretch: number;
}

/** Half the spacing of the levels of one rail. */
const halfStep = (side: number): number => Math.sqrt(1.5 / (side ** 2 - 1));

/** Levels of one rail, rising. */
const levels = (side: number): number[] => Array.from({ length: side }, (_, k) => (2 * k - side + 1) * halfStep(side));

/** Beyond this many deviations the error function is ±1 to 1e-12. */
const certain = 7;

/** f(x), mean of the sliced rail over the noise. */
function slicedMean({ side, deviation, stretch }: RailDecision, x: number): number {
  const half = halfStep(side);
  let sum = 0;
  for (let k = 1; k < side; k += 1) {
    const beyond = x - stretch * (2 * k - side) * half;
    const far = certain * deviation;
    sum += Math.abs(beyond) >= far ? Math.sign(beyond) : erf((beyond / deviation) * Math.SQRT1_2);
  }
  return half * sum;
}

/** f′(x). */
function slicedSlope({ side, deviation, stretch }: RailDecision, x: number): number {
  const half = halfStep(side);
  let sum = 0;
  for (let k = 1; k < side; k += 1) sum += normalDensity((x - stretch * (2 * k - side) * half) / deviation);
  return (2 * half * sum) / deviation;
}

/** Mean square of the sliced rail: its levels' squares, each by the probability of its slice. */
function slicedPower(rail: RailDecision, x: number): number {
  const { side, deviation, stretch } = rail;
  const half = halfStep(side);
  let power = (side - 1) ** 2 * half ** 2;
  for (let k = 1; k < side; k += 1) {
    const above = (1 + erf(((x - stretch * (2 * k - side) * half) / deviation) * Math.SQRT1_2)) / 2;
    // The square steps from (2k − side − 1)² to (2k − side + 1)² at the threshold.
    power += 4 * (2 * k - side) * half ** 2 * above;
  }
  return power;
}

/** Mean of Im(z · conj â) at a static phase x: E[mQ f(mI) − mI f(mQ)] over one quadrant, m = a e^(jx). */
export function railCurve(rail: RailDecision, x: number): number {
  const [cos, sin] = [Math.cos(x), Math.sin(x)];
  const quadrant = levels(rail.side).filter((level) => level > 0);
  let sum = 0;
  for (const i of quadrant) {
    for (const q of quadrant) {
      const [mI, mQ] = [i * cos - q * sin, i * sin + q * cos];
      sum += mQ * slicedMean(rail, mI) - mI * slicedMean(rail, mQ);
    }
  }
  return sum / quadrant.length ** 2;
}

const overLevels = (rail: RailDecision, value: (x: number) => number): number =>
  levels(rail.side).reduce((sum, x) => sum + value(x), 0) / rail.side;

/** Slope of that curve at lock: 2E[x f(x)] − E f′(x), E x² = ½. */
export const railSlope = (rail: RailDecision): number =>
  overLevels(rail, (x) => 2 * x * slicedMean(rail, x) - slicedSlope(rail, x));

/** Mean square of zQ âI − zI âQ at lock: 2 E z² · E â² − 2 (E zâ)² of one rail. */
export function railVariance(rail: RailDecision): number {
  const power = overLevels(rail, (x) => slicedPower(rail, x));
  const product = overLevels(rail, (x) => x * slicedMean(rail, x) + rail.deviation ** 2 * slicedSlope(rail, x));
  return 2 * (0.5 + rail.deviation ** 2) * power - 2 * product ** 2;
}
