import type { ImplementationLoss } from '../model/design';
import type { ErrorRate } from '../detectors/symbol-error-rate';

export interface LossInput {
  /** P(γ, φ) of the modulation. */
  errorRate: ErrorRate;
  /** Operating point γ as a ratio. */
  esN0: number;
  /** Variance of the phase, rad². */
  variance: number;
  /** Standing error of the phase, radians. */
  bias: number;
}

/** The mean is taken over so many deviations to either side: at high Es/N0 rare phases make most of the errors. */
const reach = 16;
/** Widest and narrowest step of the mean, deviations. */
const [widest, narrowest] = [0.75, 0.1];
const negligible = 1e-8;
/** Smallest error rate that is worth a loss. */
const least = 1e-300;
/** Es/N0 below which none is sought, dB. */
const lowestDb = -40;

/**
 * What phase jitter costs at the operating point: loss = 10·log10(γ/γ′), γ′ the Es/N0 at which the error rate without
 * jitter, P(γ′, 0), is the mean of P(γ, φ) over normal φ of that variance and bias. The mean is a trapezoid sum, which
 * for a normal density converges faster than any power of its step.
 *
 * @returns lossDb null where no Es/N0 has that error rate, or the rate is below 1e-300
 * @example BPSK with a standing error of 10° and no jitter // => lossDb 0.133
 */
export function implementationLoss(input: LossInput): ImplementationLoss {
  const { errorRate, esN0 } = input;
  const symbolErrorRate = meanErrorRate(input);
  const idealSymbolErrorRate = errorRate(esN0, 0);
  return {
    lossDb: symbolErrorRate > least ? lossDb(input, symbolErrorRate) : null,
    symbolErrorRate,
    idealSymbolErrorRate,
  };
}

function meanErrorRate({ errorRate, esN0, variance, bias }: LossInput): number {
  const deviation = Math.sqrt(variance);
  // The rate of errors rises over an angle of about one deviation of the noise.
  const step = Math.max(narrowest, Math.min(widest, 1.2 / (deviation * Math.sqrt(2 * esN0))));
  const at = (x: number): number => errorRate(esN0, bias + deviation * x);
  let [sum, weights] = [at(0), 1];
  for (let x = step; x < reach; x += step) {
    const weight = Math.exp((-x * x) / 2);
    // A constellation that is its own mirror image errs alike at φ and −φ.
    sum += weight * (bias === 0 ? 2 * at(x) : at(x) + at(-x));
    weights += 2 * weight;
    // No rate is above 1, so that what is left cannot count any more.
    if (weight < negligible * sum) break;
  }
  return sum / weights;
}

/** By false position over dB and the logarithm of the rate, from the operating point down. */
function lossDb({ errorRate, esN0 }: LossInput, rate: number): number | null {
  const gap = (db: number): number => Math.log(Math.max(errorRate(10 ** (db / 10), 0), least) / rate);
  const top = 10 * Math.log10(esN0);
  let [high, highGap] = [top, gap(top)];
  if (highGap >= 0) return 0;
  let [low, lowGap, width] = [high, highGap, 0.25];
  while (lowGap < 0 && low > lowestDb) {
    [high, highGap] = [low, lowGap];
    low = Math.max(lowestDb, low - width);
    lowGap = gap(low);
    width *= 2;
  }
  if (lowGap < 0) return null;
  for (let round = 0; round < 60 && high - low > 1e-9; round += 1) {
    const share = round % 3 === 2 ? 0.5 : highGap / (highGap - lowGap);
    const middle = high - share * (high - low);
    const middleGap = gap(middle);
    if (Math.abs(middleGap) < 1e-8) return top - middle;
    if (middleGap < 0) [high, highGap] = [middle, middleGap];
    else [low, lowGap] = [middle, middleGap];
  }
  return top - (high + low) / 2;
}
