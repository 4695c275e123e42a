import { boundedMemo } from '../math/bounded-memo';
import { ParameterError } from '../parameter-error';
import type { CompleteClock } from '../plan/complete';
import { requireSense } from './clock-sense';
import type { ClockSignal } from './clock-signal';
import type { DetectorModel } from './detector';
import { railsOf } from './rails';
import { gardnerSlope, leastVariance, signCurve, signSlope } from './sign-timing';
import { earlyLateOffset, timingCovariance } from './timing-covariance';
import type { SignDetector } from './sign-timing';
import type { TimingSignal } from './timing-covariance';

export type { ClockSignal } from './clock-signal';
export { gardnerSlope } from './sign-timing';

export type TimingDetectorName = CompleteClock['detector'];

interface Timing {
  detector: TimingDetectorName;
  signal: ClockSignal;
}

function cleanKeyOf({ detector, signal: { modulation, ringRatios, rollOff } }: Timing): string {
  return JSON.stringify([detector, modulation, ringRatios, rollOff]);
}

const models = boundedMemo(
  modelOf,
  (timing) => `${cleanKeyOf(timing)} ${timing.signal.amplitude} ${timing.signal.esN0}`,
  32,
);

/**
 * The timing detector of a clock loop at its operating point, both rails added; x is how early the strobe comes,
 * symbols, and the slope at lock is positive. The whole curve is periodic in one symbol.
 *
 * @throws {ParameterError} pointing at the detector or at the signal on which it has no slope, with what to take instead
 */
export function clockDetector(detector: TimingDetectorName, signal: ClockSignal): DetectorModel {
  requireSense(detector, signal);
  return models({ detector, signal });
}

function modelOf({ detector, signal }: Timing): DetectorModel {
  const { amplitude, esN0 } = signal;
  const clean = cleanTiming({ detector, signal });
  const noisy = { ...clean.timing, variance: 1 / (2 * esN0) };
  const squared = detector === 'gardner' || detector === 'early-late';
  const scale = squared ? amplitude ** 2 : amplitude;
  const powers = (values: readonly number[]) => values.map((value) => scale ** 2 * value);
  return {
    ...(squared ? sine(detector, signal.rollOff, scale) : signDetector(detector, { clean, noisy, scale, signal })),
    period: 1,
    covariance: powers(timingCovariance(detector, noisy)),
    selfCovariance: powers(clean.covariance),
    amplitudeExponent: squared ? 2 : 1,
  };
}

/** What is left without noise, at unit amplitude. */
interface CleanTiming {
  timing: TimingSignal;
  covariance: readonly number[];
}

const cleanTiming = boundedMemo(
  ({ detector, signal: { modulation, ringRatios, rollOff } }: Timing): CleanTiming => {
    const timing = { rails: railsOf(modulation, ringRatios), rollOff, variance: 0 };
    return { timing, covariance: timingCovariance(detector, timing) };
  },
  cleanKeyOf,
  32,
);

type Curve = Pick<DetectorModel, 'gain' | 'gainWithoutNoise' | 'noisy' | 'noiseless'>;

/**
 * Slope of |y(+δ)|² − |y(−δ)|² at lock over A², both rails added, per symbol: πα sin 2πδ.
 *
 * @see U. Mengali, A. D'Andrea, "Synchronization Techniques for Digital Receivers", 1997, for early-late detectors
 */
export const earlyLateSlope = (rollOff: number): number => Math.PI * rollOff * Math.sin(2 * Math.PI * earlyLateOffset);

/** Detectors of second order see the one line that the signal's power has at the symbol rate: a sine, whatever the noise. */
function sine(detector: 'gardner' | 'early-late', rollOff: number, scale: number): Curve {
  const gain = scale * (detector === 'gardner' ? gardnerSlope(rollOff) : earlyLateSlope(rollOff));
  const curve = (x: number): number => (gain / (2 * Math.PI)) * Math.sin(2 * Math.PI * x);
  return { gain, gainWithoutNoise: gain, noisy: curve, noiseless: curve };
}

interface Signs {
  clean: CleanTiming;
  noisy: TimingSignal;
  scale: number;
  signal: ClockSignal;
}

/** Slope, over that without noise, below which decisions no longer tell early from late. */
const leastShare = 0.01;

function signDetector(detector: SignDetector, { clean, noisy, scale, signal }: Signs): Curve {
  const [slope, without] = [signSlope(detector, noisy), signSlope(detector, clean.timing)];
  if (!(slope > leastShare * without)) {
    throw new ParameterError(
      '/signal/esN0Db',
      `at this Es/N0 the signs of ${signal.modulation} leave ${detector} no slope; take gardner`,
    );
  }
  const cleanCurve = () => cleanCurves({ detector, signal });
  const curve = noisy.variance > leastVariance ? signCurve(detector, noisy) : cleanCurve();
  return {
    gain: scale * slope,
    gainWithoutNoise: scale * without,
    noisy: (x) => scale * curve(x),
    noiseless: (x) => scale * cleanCurve()(x),
  };
}

/** Curves without noise, which no Es/N0 changes; they take the longest. */
const cleanCurves = boundedMemo(
  ({ detector, signal }: { detector: SignDetector; signal: ClockSignal }) =>
    signCurve(detector, cleanTiming({ detector, signal }).timing),
  cleanKeyOf,
  32,
);
