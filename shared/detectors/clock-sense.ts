import { ParameterError } from '../parameter-error';
import type { CompleteClock } from '../plan/complete';
import type { ClockSignal } from './clock-signal';

type Detector = CompleteClock['detector'];

/**
 * Refuses the pairs of timing detector and signal that make no sense.
 *
 * @throws {ParameterError} with the reason, and what to take instead
 */
export function requireSense(detector: Detector, signal: ClockSignal): void {
  requireTogetherRails(signal);
  if (detector === 'mueller-muller') requireOneSample(signal);
  else requireTwoSamples(detector, signal);
  if (detector === 'gardner' || detector === 'early-late') requireRollOff(detector, signal);
  else requireSigns(detector, signal);
}

function requireTogetherRails({ modulation }: ClockSignal): void {
  if (modulation !== 'OQPSK') return;
  throw new ParameterError(
    '/signal/modulation',
    'one strobe takes both rails, and those of OQPSK are half a symbol apart: their slopes cancel; take QPSK, or plan the carrier loop alone',
  );
}

/** One sample a symbol leaves nothing between strobes to use; whoever has two has better detectors. */
function requireOneSample({ samplesPerSymbol }: ClockSignal): void {
  if (samplesPerSymbol < 2) return;
  throw new ParameterError(
    '/clock/detector',
    `mueller-muller takes one sample per symbol; at ${samplesPerSymbol} samples per symbol take gardner or zero-crossing`,
  );
}

function requireTwoSamples(detector: Detector, { samplesPerSymbol }: ClockSignal): void {
  if (samplesPerSymbol >= 2) return;
  throw new ParameterError(
    '/signal/samplesPerSymbol',
    `${detector} needs at least 2 samples per symbol; take 2, or mueller-muller with fewer`,
  );
}

function requireRollOff(detector: Detector, { rollOff }: ClockSignal): void {
  if (rollOff > 0) return;
  throw new ParameterError(
    '/signal/rollOff',
    `${detector} has no slope at roll-off 0; take a roll-off above 0, or zero-crossing`,
  );
}

/**
 * Where a rail of a point is 0 its sign is that of the offset and of the noise alone: with little noise the slope turns
 * round at lock.
 */
function requireSigns(detector: Detector, { modulation }: ClockSignal): void {
  if (modulation !== '8PSK' && modulation !== '32APSK') return;
  throw new ParameterError(
    '/clock/detector',
    `${detector} takes the sign of each rail, and ${modulation} has points with a rail of 0; take gardner`,
  );
}
