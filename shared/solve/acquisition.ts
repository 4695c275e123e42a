import type { Solution } from '../model/design';
import { numberText, quantityText } from '../quantities/format';
import { fieldNumber } from '../plan/fields';
import { scaledTime } from '../findings/acquisition';
import type { AcquisitionTime } from '../findings/acquisition';
import { bisect } from '../math/root-search';
import { stageAt } from '../findings/loop-view';
import type { LoopView, StageView } from '../findings/loop-view';
import { bandwidthChange, safe, solution } from './solution';
import { nominalBandwidth } from '../findings/narrower';

const limit = '/limits/acquisitionSymbols';
/** Logarithm of how much wider or narrower than now is looked at. */
const widestFactor = 10;

/** The narrowest bandwidth of the first stage that acquires in time, and the largest offset that it acquires from. */
export function acquisitionSolutions(view: LoopView): Solution[] {
  const at = stageAt(view, 0);
  const pull = view.design.acquisition.pullInSymbols;
  const settling = at.result.settlingUpdates;
  if (pull === null || settling === null) return [];
  const time = { pull, settling: settling * view.loop.updateInterval };
  return [narrowestBandwidth(at, time), ...largestOffset(at, time)];
}

const limitText = ({ plan }: LoopView): string =>
  `Acquisition, max ${numberText(plan.limits.acquisitionSymbols)} symbols`;

function narrowestBandwidth(view: StageView, time: AcquisitionTime): Solution {
  const { stage, plan } = view;
  const allowed = plan.limits.acquisitionSymbols;
  const present = nominalBandwidth(view);
  const over = (x: number): number => Math.log(scaledTime(time, Math.exp(x)) / allowed);
  const value = present * Math.exp(bisect(over, -widestFactor, widestFactor));
  const parts = {
    slug: 'acquisition.narrowest-bandwidth',
    stage: stage.name,
    title: `narrowest BnT of ${stage.name}`,
    limit,
    limitText: limitText(view),
    sense: 'min' as const,
    present,
    estimate: true,
  };
  if (value * view.loop.updateInterval > 0.1) {
    return solution(view, {
      ...parts,
      note: `It would take BnT ${numberText(value, { significant: 2 })}: allow more symbols or search the offset.`,
    });
  }
  return solution(view, { ...parts, value, change: bandwidthChange(view, value, 'min') });
}

/**
 * Δω² = (n − settling)·T·4ζωn³⟨s²⟩, no less than the lock-in range and no more than what the loop can tell apart and hold.
 *
 * @see F. Gardner, "Phaselock Techniques", 3rd ed. 2005, for the pull-in time
 */
function largestOffset(view: StageView, { settling }: AcquisitionTime): Solution[] {
  const { key, plan, result, design } = view;
  const { acquisition: range } = design;
  const [zeta, naturalHz] = [result.damping.exact, result.naturalFrequencyHz.exact];
  if (key !== 'carrier' || zeta === null || naturalHz === null || range.lockInHz === null) return [];
  const parts = {
    slug: 'acquisition.largest-offset',
    stage: view.stage.name,
    title: `largest offset that ${view.stage.name} locks from`,
    limit,
    limitText: limitText(view),
    sense: 'max' as const,
    unit: 'Hz',
    present: range.offsetHz,
    estimate: true,
  };
  const seconds = (plan.limits.acquisitionSymbols - settling) / plan.signal.symbolRateBd;
  if (seconds <= 0) return [solution(view, { ...parts, note: 'Settling alone takes longer.' })];
  const pulled = Math.sqrt(seconds * 4 * zeta * (2 * Math.PI * naturalHz) ** 3 * meanSquare(view)) / (2 * Math.PI);
  const bounds = [range.pullInRangeHz, range.unambiguousHz, range.largestOffsetHz].filter((value) => value !== null);
  const value = Math.min(Math.max(pulled, range.lockInHz), ...bounds);
  return [solution(view, { ...parts, value, change: toleranceChange(view, value) })];
}

/** Mean square of the S-curve with noise over its slope, over one period. */
function meanSquare({ design: { detector } }: StageView): number {
  const values = detector.curve.noisy.slice(0, -1).filter((value) => value !== null);
  return values.reduce((sum, value) => sum + (value / detector.gain) ** 2, 0) / Math.max(1, values.length);
}

/** The tolerance of each end that comes to an offset; none where the plan names no carrier, or Doppler alone is more. */
function toleranceChange({ plan }: StageView, offsetHz: number): Solution['change'] {
  const { carrierFrequencyHz, dopplerHz } = plan.environment;
  if (carrierFrequencyHz === undefined || offsetHz <= dopplerHz) return null;
  const pointer = '/environment/carrierTolerancePpm';
  const value = safe(((offsetHz - dopplerHz) / (2 * carrierFrequencyHz)) * 1e6, 'max');
  return {
    pointer,
    value,
    label: `Set ${fieldNumber(pointer)} to ${quantityText(value, { unit: 'ppm', symmetric: true })}`,
  };
}
