import type { MarginAgainstDelay, Response } from '../model/design';
import { largestBetween, bisect } from '../math/root-search';
import { circlePoints, closedLoopPower, logarithmicPoints, responsePowers } from './frequency-response';
import type { LinearLoop } from './linear-loop';
import { phaseMarginDeg } from './margins';
import type { GainCrossing } from './margins';

const responsePoints = 105;
/** The longest delay that a plan can ask for, updates. */
const longestDelay = 64;

export interface ClosedLoopShape {
  /** Largest |H|, dB. */
  peakingDb: number;
  /** Frequency at which |H|² first falls to ½, cycles per update; null where it never does. */
  bandwidth3Db: number | null;
  response: Response;
}

/** |H| and |E| from well below the loop's own frequency up to half an update rate, with peak and 3 dB bandwidth. */
export function closedLoopShape(loop: LinearLoop, updateRateHz: number): ClosedLoopShape {
  const omega = responseFrequencies(loop);
  const { h, e } = responsePowers(loop, circlePoints(loop, omega));
  const frequency = Array.from(omega, (value) => value / (2 * Math.PI));
  return {
    peakingDb: 10 * Math.log10(peakPower(loop, omega, h)),
    bandwidth3Db: halfPowerFrequency(loop, omega, h),
    response: {
      frequency,
      frequencyHz: frequency.map((value) => value * updateRateHz),
      hDb: Array.from(h, decibels),
      eDb: Array.from(e, decibels),
    },
  };
}

/** The axis of a loop whose response means nothing, because it is unstable. */
export function emptyResponse(loop: LinearLoop, updateRateHz: number): Response {
  const frequency = Array.from(responseFrequencies(loop), (value) => value / (2 * Math.PI));
  const none = frequency.map(() => null);
  return { frequency, frequencyHz: frequency.map((value) => value * updateRateHz), hDb: none, eDb: none };
}

function responseFrequencies({ gains: { g1, g2, g3 } }: LinearLoop): Float64Array {
  const own = Math.min(Math.max(g1, Math.sqrt(g2), Math.cbrt(g3)), 1) || 1;
  return logarithmicPoints(own / 100, Math.PI, responsePoints);
}

/** 10·log10 as a curve needs it, to 1e−6 dB; null where it has no value. */
function decibels(power: number): number | null {
  const value = 10 * Math.log10(power);
  return Number.isFinite(value) ? Math.round(1e6 * value) / 1e6 : null;
}

function peakPower(loop: LinearLoop, omega: Float64Array, h: Float64Array): number {
  const top = h.reduce((best, value, i) => (value > (h[best] as number) ? i : best), 0);
  const [from, to] = [omega[Math.max(top - 1, 0)] as number, omega[Math.min(top + 1, omega.length - 1)] as number];
  return Math.max(1, h[top] as number, largestBetween(closedLoopPower(loop), from, to, 24).value);
}

function halfPowerFrequency(loop: LinearLoop, omega: Float64Array, h: Float64Array): number | null {
  const below = h.findIndex((value) => value < 0.5);
  if (below < 1) return null;
  const from = omega[below - 1] as number;
  const power = closedLoopPower(loop);
  return bisect((value) => power(value) - 0.5, from, omega[below] as number) / (2 * Math.PI);
}

/** Phase margin of these gains over every extra delay that a plan can ask for; null where the loop is unstable. */
export function marginCurve(loop: LinearLoop, crossings: readonly GainCrossing[]): MarginAgainstDelay {
  const delay = Array.from({ length: longestDelay + 1 }, (_, d) => d);
  const phaseDeg = delay.map((d) => {
    const margin = phaseMarginDeg(crossings, d - loop.delay);
    return margin !== null && margin > 0 ? margin : null;
  });
  return { delay, phaseDeg };
}
