import type { Point } from '../fixed-point/constellation';
import { distinctPoints, rotationalSymmetry } from './modulations';
import type { Modulation } from './modulations';
import { noisyMoment } from './noisy-moments';
import { tapAt, tapPower } from './offset-interference';

export interface LockSignal {
  modulation: Modulation;
  /** Es/N0 γ as a ratio, above 0. */
  esN0: number;
  /** Radii of the outer rings of APSK over the inner one; the usual ones where there are none. */
  ringRatios?: readonly number[] | undefined;
  /** Roll-off α of the raised-cosine pulse: OQPSK alone depends on it. */
  rollOff?: number;
  /** Variance σ² of the phase in lock, rad². */
  jitterVariance: number;
  /** Noise bandwidth BnT of the loop that makes the jitter, cycles per symbol; without it jitter is new each symbol. */
  noiseBandwidth?: number;
  /** Symbols N of a block. */
  averagingSymbols: number;
}

export interface LockStatistic {
  /** Mean of num/den of a block in lock. */
  meanLocked: number;
  /** Its standard deviation from block to block. */
  deviationLocked: number;
  /** The same while the phase is anywhere: the mean is 0. */
  deviationUnlocked: number;
}

/** Moments of a noisy sample z at perfect phase, M the rotational symmetry. */
interface LockMoments {
  /** |E z^M|. */
  turned: number;
  /** E|z|^M. */
  length: number;
  /** E|z|^2M. */
  lengthSquare: number;
  /** E z^2M. */
  turnedSquare: number;
  /** |E z^M|z|^M|. */
  product: number;
}

/**
 * The statistic of the datapath's lock detector, Σ σ·Re(z^M) over Σ |z|^M of a block of N symbols:
 *
 *     mean |E a^M| e^(−M²σ²/2) / E|z|^M;   unlocked deviation √(E|z|^2M/2N) / E|z|^M, 1/√(2N) for PSK without noise
 *
 * Exact moments of signal and noise; the ratio of two sums by its first-order expansion, good from some 30 symbols on.
 * Jitter is normal. It changes with the loop's own pace, so what it takes from one block it takes from 1/(2·BnT)
 * symbols together. Points that do not fall together in their M-th power leave little even in perfect lock: 16APSK
 * a hundredth.
 *
 * @throws {ParameterError} pointing at the ring ratios when they do not fit
 */
export function lockStatistic(signal: LockSignal): LockStatistic {
  const { modulation, jitterVariance, noiseBandwidth, averagingSymbols } = signal;
  const power = rotationalSymmetry[modulation];
  const moments = momentsOf(signal, power);
  const { turned, length, lengthSquare, turnedSquare, product } = moments;
  const turn = Math.exp((-(power ** 2) * jitterVariance) / 2);
  const mean = (turned * turn) / length;
  const each = (lengthSquare + turnedSquare * turn ** 4) / 2 - 2 * mean * product * turn + mean ** 2 * lengthSquare;
  const jitter = (turned * (1 - turn ** 2)) ** 2 / 2;
  const together = noiseBandwidth ? Math.max(1, 1 / (2 * noiseBandwidth)) : 1;
  const variance = (each - jitter) / averagingSymbols + jitter * Math.min(1, together / averagingSymbols);
  return {
    meanLocked: mean,
    deviationLocked: Math.sqrt(Math.max(0, variance)) / length,
    deviationUnlocked: Math.sqrt(lengthSquare / (2 * averagingSymbols)) / length,
  };
}

function momentsOf({ modulation, esN0, ringRatios, rollOff = 0.35 }: LockSignal, power: number): LockMoments {
  if (modulation === 'OQPSK') return offsetMoments(esN0, rollOff);
  const points: readonly Point[] = distinctPoints(modulation, ringRatios);
  const moment = (p: number, q: number) => noisyMoment(points, esN0, p, q);
  return {
    turned: Math.abs(moment(power, 0)),
    length: moment(power / 2, power / 2),
    lengthSquare: moment(power, power),
    turnedSquare: moment(2 * power, 0),
    product: Math.abs(moment((3 * power) / 2, power / 2)),
  };
}

/** Symbols on either side whose fourth powers are added up. */
const neighbours = 32;

/** OQPSK at the in-phase strobe: one rail at its symbol, the other half-way between its own; M = 2. */
function offsetMoments(esN0: number, rollOff: number): LockMoments {
  const noise = 1 / (2 * esN0);
  const between = tapPower(rollOff) / 2;
  let fourth = 0;
  for (let k = 0; k < neighbours; k += 1) fourth += tapAt(k, rollOff) ** 4;
  const square = { strobe: 1 / 2 + noise, between: between + noise };
  const strobe = noisyFourth(1 / 2, 1 / 4, noise);
  // A sum of ±c_k has 3(Σ c²)² − 2 Σ c⁴ as its fourth moment; there are two taps of each size, c⁴ = g⁴/4.
  const half = noisyFourth(between, 3 * between ** 2 - fourth, noise);
  return {
    turned: square.strobe - square.between,
    length: square.strobe + square.between,
    lengthSquare: strobe + 2 * square.strobe * square.between + half,
    turnedSquare: strobe - 6 * square.strobe * square.between + half,
    product: strobe - half,
  };
}

/** E(x + n)⁴ from E x², E x⁴ and the variance of the noise. */
const noisyFourth = (square: number, fourth: number, noise: number): number =>
  fourth + 6 * square * noise + 3 * noise ** 2;
