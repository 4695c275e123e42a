import { isMemoryless, varianceOf } from '../detectors/detector';
import type { DetectorModel } from '../detectors/detector';
import { noiseBandwidth } from '../loop/noise-bandwidth';
import type { LinearLoop } from '../loop/linear-loop';
import { oscillatorVariance } from './phase-noise';
import type { PhaseNoiseGrid } from './phase-noise';

/** Variances in the detector's own unit of the argument: rad² for a carrier, symbols² for a clock. */
export interface JitterVariance {
  thermal: number | null;
  oscillator: number | null;
  /** Sum of what is known; null when the thermal part is not. */
  total: number | null;
}

/**
 * Variance that noise at the detector leaves on a stable loop: 2·BnT·var(e)/Kd², exact where errors are uncorrelated.
 * BnT is per symbol: an average of U errors has 1/U of their variance and U times the update interval.
 *
 * @returns null for an unstable loop, and for a detector whose errors are coloured
 */
export function thermalVariance(loop: LinearLoop, model: DetectorModel, updateInterval: number): number | null {
  const bandwidth = noiseBandwidth(loop);
  const variance = varianceOf(model);
  if (bandwidth === null || variance === null || !isMemoryless(model)) return null;
  return (2 * (bandwidth / updateInterval) * variance) / model.gain ** 2;
}

/** Thermal and oscillator part of one loop. Without a phase-noise table the oscillator's part is null, not nought. */
export function jitterVariance(
  loop: LinearLoop,
  model: DetectorModel,
  updateInterval: number,
  grid: PhaseNoiseGrid | null,
): JitterVariance {
  const thermal = thermalVariance(loop, model, updateInterval);
  if (thermal === null) return { thermal: null, oscillator: null, total: null };
  const oscillator = grid && oscillatorVariance(loop, grid);
  // A table without a finite variance leaves no total that would be true.
  return { thermal, oscillator, total: grid && oscillator === null ? null : thermal + (oscillator ?? 0) };
}
