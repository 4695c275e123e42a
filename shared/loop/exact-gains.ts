import { ParameterError } from '../parameter-error';
import { bisect, largestBetween } from '../math/root-search';
import { multiplyModulo, pairOf, powerModulo, reciprocalModulo } from '../math/pole-pair';
import type { PolePair, Remainder } from '../math/pole-pair';
import { dominantPair } from './dominant-pair';
import { bandwidthOverOmega, nominalGains } from './gains';
import { averagingWeight, linearLoop } from './linear-loop';
import type { LinearLoop } from './linear-loop';
import { noiseBandwidth } from './noise-bandwidth';
import type { ThirdOrderForm } from './third-order-form';

export interface LoopShape {
  order: number;
  /** Damping factor ζ that the loop is to have with its delay; order 2 only. */
  damping: number;
  /** Extra pipeline delay D, updates. */
  delay: number;
  /** Symbols averaged into one update, 1 where nothing is averaged. */
  averaged: number;
  /** Analog form of order 3; the published one where absent. */
  form?: ThirdOrderForm | undefined;
}

/** Loop with its free frequency: θ = ωTu/2 of K, ωn or ω0. */
type Family = (theta: number) => LinearLoop | null;

/**
 * Order-2 loop whose dominant pole pair, with the delay, is the bilinear image of s² + 2ζωn·s + ωn². Modulo the
 * pair the closed-loop polynomial is a line, and the two gains that make it vanish follow without iteration.
 *
 * @returns null where the gains would not be above 0, or where the pair is not the one continued from D = 0
 */
export function placedLoop(shape: LoopShape, theta: number): LinearLoop | null {
  const pair = pairOf({ damping: shape.damping, theta });
  const forward = forwardThatPlaces(shape, pair);
  const gains = { g1: forward.u - forward.v, g2: forward.v, g3: 0 };
  if (!(gains.g1 > 0 && gains.g2 > 0)) return null;
  const loop = linearLoop({ gains, delay: shape.delay, averaged: shape.averaged });
  return isSamePair(dominantPair(loop), pair) ? loop : null;
}

/** (g1 + g2)·w + g2 that makes z^E·w² + ((g1 + g2)·w + g2)·(1 + a·w) vanish at both poles. */
function forwardThatPlaces({ delay, averaged }: LoopShape, pair: PolePair): Remainder {
  const doubleIntegral = { u: -pair.alpha, v: -pair.beta };
  const delayed = multiplyModulo(powerModulo(delay + (averaged > 1 ? 1 : 0), pair), doubleIntegral, pair);
  const forward =
    averaged > 1 ? multiplyModulo(delayed, reciprocalModulo(averagingWeight(averaged), pair), pair) : delayed;
  return { u: -forward.u, v: -forward.v };
}

const isSamePair = (found: PolePair | null, wanted: PolePair): boolean =>
  found !== null &&
  Math.abs(found.beta - wanted.beta) < 1e-6 * wanted.beta &&
  Math.abs(found.alpha - wanted.alpha) < 1e-6 * Math.sqrt(wanted.beta);

/**
 * Loop whose noise bandwidth, delay included, is the wanted one; of order 2 also with the wanted damping factor.
 * Orders 1 and 3 scale their one free frequency.
 *
 * @param wanted Bn·Tu, cycles per update
 * @throws {ParameterError} naming `noiseBandwidth`, with the widest bandwidth that can be reached, cycles per update
 * @example exactLoop({ order: 2, damping: Math.SQRT1_2, delay: 3, averaged: 1 }, 0.02) // g1 0.0436517, g2 0.00097382
 */
export function exactLoop(shape: LoopShape, wanted: number): { loop: LinearLoop; theta: number } {
  const family = familyOf(shape);
  const start = wanted / (2 * bandwidthOverOmega(shape.order, shape.damping, shape.form));
  const bandwidthAt = (theta: number): number => bandwidthOf(family, theta);
  let upper = start;
  if (!(bandwidthAt(upper) >= wanted)) upper = widest(bandwidthAt, wanted, start);
  const theta = solveRising(bandwidthAt, wanted, upper);
  return { loop: family(theta) as LinearLoop, theta };
}

const familyOf = (shape: LoopShape): Family =>
  shape.order === 2
    ? (theta) => placedLoop(shape, theta)
    : (theta) =>
        linearLoop({
          gains: nominalGains(shape.order, { damping: 1, theta, form: shape.form }),
          delay: shape.delay,
          averaged: shape.averaged,
        });

/** Noise bandwidth of the family at θ; NaN where it has no stable loop. */
function bandwidthOf(family: Family, theta: number): number {
  const loop = family(theta);
  return (loop && noiseBandwidth(loop)) ?? NaN;
}

/** θ of the widest bandwidth below `start`, when that is wide enough. */
function widest(bandwidthAt: (theta: number) => number, wanted: number, start: number): number {
  const top = peak(bandwidthAt, start);
  const reached = bandwidthAt(top);
  if (reached >= wanted) return top;
  throw new OutOfReach(reached);
}

/** No gains reach the wanted bandwidth with this delay. */
export class OutOfReach extends ParameterError {
  /** @param widestBandwidth widest bandwidth that can be reached, cycles per update */
  constructor(readonly widestBandwidth: number) {
    super(
      'noiseBandwidth',
      `with this delay the widest noise bandwidth that can be reached is ${widestBandwidth} per update`,
    );
  }
}

/** Largest θ at or below `start` whose order-2 loop with this delay can be placed and is stable. */
export function largestTheta(shape: LoopShape, start: number): number {
  const placed = (theta: number): boolean => bandwidthOf(familyOf(shape), theta) > 0;
  let low = start;
  while (!placed(low) && low > 1e-9) low /= 2;
  return placed(2 * low) ? low : bisect((theta) => (placed(theta) ? -1 : 1), low, 2 * low);
}

/** Where the bandwidth stops rising with θ: it turns, or its pole pair ends, or the loop is unstable. */
function peak(bandwidthAt: (theta: number) => number, start: number): number {
  const known = (theta: number): number => bandwidthAt(theta) || 0;
  const ratio = 1.15;
  let top = start;
  while (known(top) === 0 && top > 1e-9) top /= 2;
  // Down to where the bandwidth is sure to rise, then up again until it does not.
  while (top > start / 64 && known(top / 2) > known(top)) top /= 2;
  while (known(top * ratio) > known(top)) top *= ratio;
  return largestBetween(known, top / ratio, top * ratio).x;
}

/** The θ in (0, upper] at which a rising bandwidth is the wanted one, by bracketed false position in logarithms. */
function solveRising(bandwidthAt: (theta: number) => number, wanted: number, upper: number): number {
  const gap = (theta: number): number => Math.log(bandwidthAt(theta) / wanted);
  let high = upper;
  let highGap = gap(high);
  let low = high * Math.exp(-highGap - 1e-3);
  let lowGap = gap(low);
  while (lowGap > 0) [high, highGap, low, lowGap] = [low, lowGap, low / 2, gap(low / 2)];
  for (let round = 0; round < 200 && highGap > 1e-13; round += 1) {
    const guess = round % 3 === 2 ? Math.sqrt(low * high) : high * (high / low) ** (-highGap / (highGap - lowGap));
    const middle = guess > low && guess < high ? guess : Math.sqrt(low * high);
    if (middle <= low || middle >= high) break;
    const middleGap = gap(middle);
    if (middleGap > 0) [high, highGap] = [middle, middleGap];
    else if (middleGap > -1e-13) return middle;
    else [low, lowGap] = [middle, middleGap];
  }
  return high;
}
