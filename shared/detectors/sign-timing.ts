import { sineSeries } from '../math/sine-series';
import { raisedCosine, raisedCosineSlope, sampledCorrelation } from './pulse';
import { railMoments } from './rails';
import { signCorrelation } from './sign-correlation';
import type { TimingSignal } from './timing-covariance';

export type SignDetector = 'zero-crossing' | 'mueller-muller';

/** Distance, symbols, between the decided strobe and the sample that it is multiplied with. */
const distance: Record<SignDetector, number> = { 'zero-crossing': 0.5, 'mueller-muller': 1 };

/**
 * Slope at lock of m·(ŝ′ − ŝ) or of ŝ′y − ŝy′, both rails added, unit amplitude, per symbol. With d the distance of
 * the two samples and p the density of a rail's strobe at 0
 *
 *     Σ rails 2|g′(d)|·(E a·sgn y − 2p·E a²) + [zero-crossing: Gardner's slope]·2p·E a²
 *
 * The second term is how the decisions follow the offset that they are to show. Derived from the mean of the error.
 */
export function signSlope(detector: SignDetector, { rails, rollOff, variance }: TimingSignal): number {
  const shape = 2 * Math.abs(raisedCosineSlope(distance[detector], rollOff));
  const regained = detector === 'zero-crossing' ? gardnerSlope(rollOff) : 0;
  return [rails.inPhase, rails.quadrature].reduce((sum, rail) => {
    const { decided, power, turning } = railMoments(rail, variance);
    return sum + shape * (decided - power * turning) + regained * power * turning;
  }, 0);
}

/**
 * Slope of the Gardner detector at lock over A², both rails added, per symbol: 2 sin(πα/2)/(1 − α²/4).
 *
 * @see F. Gardner, "A BPSK/QPSK timing-error detector for sampled receivers", 1986
 */
export const gardnerSlope = (rollOff: number): number =>
  (2 * Math.sin((Math.PI * rollOff) / 2)) / (1 - rollOff ** 2 / 4);

/** Points on half a period that the curve is worked out at: noise makes it smooth. */
const curvePoints = (variance: number): number => (variance > 0.03 ? 12 : variance > 0.01 ? 24 : 32);
/** Least noise of a rail that a whole curve is worked out for, 30 dB below the signal; with less it only turns more sharply. */
export const leastVariance = 5e-4;

/** The S-curve of the same detectors, x symbols early, unit amplitude. */
export function signCurve(detector: SignDetector, signal: TimingSignal): (x: number) => number {
  const variance = Math.max(signal.variance, leastVariance);
  return sineSeries((x) => signMean(detector, { ...signal, variance }, x), 1, curvePoints(variance));
}

/** Mean of the error at an offset. What noise the two samples share adds as much to one product as to the other. */
export function signMean(detector: SignDetector, { rails, rollOff, variance }: TimingSignal, early: number): number {
  const d = distance[detector];
  const weight = (k: number): number => raisedCosine(d - early - k, rollOff) - raisedCosine(-d - early - k, rollOff);
  const weighted = sampledCorrelation(-early, d, rollOff) - sampledCorrelation(-early, -d, rollOff);
  const of = (rail: TimingSignal['rails']['inPhase']): number =>
    signCorrelation({ rail, rollOff, variance, early, weight, weighted });
  const inPhase = of(rails.inPhase);
  return inPhase + (sameRail(rails) ? inPhase : of(rails.quadrature));
}

const sameRail = ({ inPhase, quadrature }: TimingSignal['rails']): boolean =>
  inPhase.length === quadrature.length &&
  inPhase.every(({ value, weight }) =>
    quadrature.some((other) => Math.abs(other.value - value) + Math.abs(other.weight - weight) < 1e-9),
  );
