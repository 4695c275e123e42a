import type { Point } from '../fixed-point/constellation';
import { tail } from '../math/gaussian-tail';
import { hidden } from './decided-mean';
import { nearestIndex, regionsOf } from './decision-regions';
import type { DecisionRegions } from './decision-regions';
import { distinctPoints } from './modulations';
import type { Modulation } from './modulations';
import { interference, tapAt } from './offset-interference';

export interface ErrorRateSignal {
  /** Es/N0 γ as a ratio, above 0. */
  esN0: number;
  /** Static error φ of the carrier phase at the decision, radians. */
  phase: number;
  /** Radii of the outer rings of APSK over the inner one; the usual ones where there are none. */
  ringRatios?: readonly number[] | undefined;
  /** Roll-off α of the raised-cosine pulse: OQPSK alone depends on it. */
  rollOff?: number | undefined;
}

/** P(γ, φ) of one modulation, γ as a ratio and φ in radians. */
export type ErrorRate = (esN0: number, phase: number) => number;

/**
 * Symbol error rate P(γ, φ) of coherent decisions with a static phase error, exact for every γ and φ.
 *
 * @throws {ParameterError} pointing at the ring ratios when they do not fit
 * @example symbolErrorRate('BPSK', { esN0: 10, phase: 0 }) // => Q(√20) = 3.9e-6
 */
export const symbolErrorRate = (modulation: Modulation, { esN0, phase, ringRatios, rollOff }: ErrorRateSignal) =>
  errorRateOf(modulation, { ringRatios, rollOff })(esN0, phase);

/** The same with what does not depend on γ and φ laid out once, for whoever needs it many times. */
export function errorRateOf(
  modulation: Modulation,
  { ringRatios, rollOff = 0.35 }: Pick<ErrorRateSignal, 'ringRatios' | 'rollOff'> = {},
): ErrorRate {
  switch (modulation) {
    case 'BPSK':
      return (esN0, phase) => tail(Math.sqrt(2 * esN0) * Math.cos(phase));
    case 'QPSK':
      return (esN0, phase) => {
        const root = Math.sqrt(2 * esN0);
        return either(tail(root * Math.cos(phase + Math.PI / 4)), tail(root * Math.sin(phase + Math.PI / 4)));
      };
    case 'OQPSK':
      return offsetErrorRate(rollOff);
    case '16QAM':
    case '64QAM':
      return railErrorRate(modulation === '16QAM' ? 4 : 8);
    default:
      return regionErrorRate(modulation, ringRatios);
  }
}

/** Probability of one of two independent faults or both. */
const either = (one: number, other: number): number => one + other - one * other;

/** Square QAM: a symbol is right when both rails fall between their thresholds; the noise of the rails is independent. */
function railErrorRate(side: number): ErrorRate {
  const half = Math.sqrt(1.5 / (side ** 2 - 1));
  const last = side - 1;
  return (esN0, phase) => {
    const root = Math.sqrt(2 * esN0) * half;
    const [cos, sin] = [Math.cos(phase), Math.sin(phase)];
    // Levels and means in half-steps: odd numbers, thresholds the even ones between them.
    const missedRail = (level: number, mean: number): number =>
      (level < last ? tail(root * (level + 1 - mean)) : 0) + tail(root * (mean - level + 1));
    let sum = 0;
    for (let i = 1; i < side; i += 2) {
      for (let q = 1; q < side; q += 2)
        sum += either(missedRail(i, i * cos - q * sin), missedRail(q, i * sin + q * cos));
    }
    return (4 * sum) / side ** 2;
  };
}

/** Any points: what the borders round each one's region let out, by the theorem of the mean decided point. */
function regionErrorRate(modulation: Modulation, ringRatios: ErrorRateSignal['ringRatios']): ErrorRate {
  const regions = regionsOf(modulation, ringRatios);
  const sent = distinctPoints(modulation, ringRatios).map(([i, q]) =>
    regionOf(regions, nearestIndex(regions.points, i, q)),
  );
  return (esN0, phase) => {
    const deviation = Math.sqrt(1 / (2 * esN0));
    const [cos, sin] = [Math.cos(phase), Math.sin(phase)];
    let sum = 0;
    for (const region of sent) sum += missed(region, deviation, cos, sin);
    return sum / sent.length;
  };
}

/** One point and the borders of its region, numbers in the order of `decisionRegions`, n pointing inward. */
interface Region {
  point: Point;
  borders: { normalI: number; normalQ: number; offset: number; from: number; to: number }[];
}

function regionOf({ points, near, far, normalI, normalQ, offset, from, to }: DecisionRegions, index: number): Region {
  const own = Array.from(near.keys()).filter((k) => near[k] === index || far[k] === index);
  const borders = own.map((k) => {
    // Seen from the far side the normal turns round, and with it the direction along the border.
    const inward = near[k] === index;
    return inward
      ? { normalI: normalI[k]!, normalQ: normalQ[k]!, offset: offset[k]!, from: from[k]!, to: to[k]! }
      : { normalI: -normalI[k]!, normalQ: -normalQ[k]!, offset: -offset[k]!, from: -to[k]!, to: -from[k]! };
  });
  return { point: points[index]!, borders };
}

/** Probability that a sample of the point, turned by a phase, falls outside its region. */
function missed({ point, borders }: Region, deviation: number, cos: number, sin: number): number {
  const [i, q] = [point[0] * cos - point[1] * sin, point[0] * sin + point[1] * cos];
  let [inside, passed] = [true, 0];
  for (const { normalI, normalQ, offset, from, to } of borders) {
    const distance = (normalI * i + normalQ * q - offset) / deviation;
    const along = normalI * q - normalQ * i;
    const share = hidden(Math.abs(distance), (from - along) / deviation, (to - along) / deviation);
    if (distance < 0) inside = false;
    passed += distance < 0 ? -share : share;
  }
  return inside ? passed : 1 + passed;
}

/**
 * OQPSK, a symbol being both rails of one pair. Turned by φ, each rail gets sin φ of the other between its strobes; the
 * pair's own share of that, ±g(½)/√2, has opposite signs on the two rails, and the rest of it is independent.
 */
function offsetErrorRate(rollOff: number): ErrorRate {
  const { values, weights, rest } = interference(rollOff, true);
  const own = Math.SQRT1_2 * tapAt(0, rollOff);
  return (esN0, phase) => {
    const [cos, sin] = [Math.cos(phase), Math.sin(phase)];
    const deviation = Math.sqrt(1 / (2 * esN0) + rest * sin ** 2);
    const missedRail = (self: number): number => {
      let sum = 0;
      for (let k = 0; k < values.length; k += 1) {
        sum += weights[k]! * tail((Math.SQRT1_2 * cos - (self + values[k]!) * sin) / deviation);
      }
      return sum;
    };
    return either(missedRail(own), missedRail(-own));
  };
}
