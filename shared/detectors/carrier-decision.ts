import { ParameterError } from '../parameter-error';
import { railCurve, railSlope, railVariance } from './carrier-decision-rails';
import { noiselessCurve, regionCurve, regionSlope, regionVariance } from './carrier-decision-regions';
import { regionsOf, stretchedRegions } from './decision-regions';
import type { DetectorModel } from './detector';
import { distinctPoints, largestMagnitude, rotationalSymmetry } from './modulations';
import type { Modulation } from './modulations';
import { shortened } from './short-curve';
import { scaledModel } from './carrier-signal';
import type { CarrierSignal } from './carrier-signal';
import { signBpsk, signQpsk } from './carrier-sign';

/** Im(z · conj â) at unit amplitude. */
interface Decision {
  curve: (x: number) => number;
  noiseless: (x: number) => number;
  variance: number;
  /** Slope at lock when the thresholds stand `stretch` times farther out than half-way between the points. */
  slope: (stretch: number) => number;
}

/** Slope that is too little to lock on, over that without noise; the sums here carry some 1e-10. */
const leastSlope = 1e-6;
/** Error of the gain control over which the change of the slope is taken, either way, dB. */
const amplitudeStepDb = 0.5;

/** Im(z · conj â), â the nearest point: on BPSK the sign detector itself, on QPSK the same over √2. */
export function decision(signal: CarrierSignal): DetectorModel {
  if (signal.modulation === 'BPSK') return signBpsk(signal);
  if (signal.modulation === 'QPSK') return scaledModel(signQpsk(signal), Math.SQRT1_2);
  return scaledModel(unitDecision(signal), signal.amplitude);
}

/**
 * The same where the points have several magnitudes or more than two rails' signs, for A = 1.
 *
 * The thresholds stand where the plan's amplitude A puts them, so a signal that comes in larger than A is judged by
 * thresholds too far in. `amplitudeExponent` is the change of the slope with the signal's real amplitude, noise and
 * signal together, over half a decibel either way: 1 where decisions are right, anything at low Es/N0.
 *
 * @throws {ParameterError} pointing at Es/N0 where so many decisions are wrong that no slope is left
 */
function unitDecision({ modulation, esN0, ringRatios }: CarrierSignal): DetectorModel {
  const { curve, noiseless, variance, slope } = decisionOf(modulation, Math.sqrt(1 / (2 * esN0)), ringRatios);
  const gain = slope(1);
  if (!(gain > leastSlope)) {
    throw new ParameterError(
      '/signal/esN0Db',
      `at this Es/N0 decision has no slope on ${modulation}, too many decisions are wrong; raise it or take known-symbols`,
    );
  }
  const period = (2 * Math.PI) / rotationalSymmetry[modulation];
  return {
    gain,
    gainWithoutNoise: 1,
    period,
    covariance: [variance],
    selfCovariance: [],
    amplitudeExponent: exponentOf(slope),
    noisy: shortened(curve, { period, esN0, largest: largestMagnitude(modulation, ringRatios) }),
    noiseless,
  };
}

function decisionOf(modulation: Modulation, deviation: number, ringRatios: CarrierSignal['ringRatios']): Decision {
  if (modulation === '16QAM' || modulation === '64QAM') {
    const rail = { side: modulation === '16QAM' ? 4 : 8, deviation, stretch: 1 };
    return {
      curve: (x) => railCurve(rail, x),
      noiseless: (x) => railCurve({ ...rail, deviation: 0 }, x),
      variance: railVariance(rail),
      slope: (stretch) => railSlope({ ...rail, stretch }),
    };
  }
  const regions = regionsOf(modulation, ringRatios);
  const decided = regions.points;
  const parts = { regions, decided, sent: distinctPoints(modulation, ringRatios), deviation };
  return {
    curve: (x) => regionCurve(parts, x),
    noiseless: (x) => noiselessCurve(parts, x),
    variance: regionVariance(parts),
    slope: (stretch) => regionSlope({ ...parts, regions: stretchedRegions(regions, stretch) }),
  };
}

/** A signal g times as large sees thresholds 1/g as far out, and gives errors g times as large. */
function exponentOf(slope: (stretch: number) => number): number {
  const step = 10 ** (amplitudeStepDb / 20);
  const [larger, smaller] = [slope(1 / step), slope(step)].map((value) => Math.max(value, leastSlope));
  return 1 + Math.log(larger! / smaller!) / (2 * Math.log(step));
}
