import type { LoopDesign, LoopInteraction } from '../model/design';
import type { CompleteClock, CompletePlan } from '../plan/complete';
import { meanSquareBandwidth } from './bounds';

export interface InteractionInput {
  plan: CompletePlan;
  carrier: LoopDesign;
  clock: LoopDesign;
}

/** Timing detectors that decide each rail, and so need the carrier's phase. */
const deciding: readonly CompleteClock['detector'][] = ['zero-crossing', 'mueller-muller'];
const radians = Math.PI / 180;

/** What the two loops of a plan do to each other, at the jitter of their last stages. */
export function loopInteraction({ plan, carrier, clock }: InteractionInput): LoopInteraction {
  const { signal } = plan;
  const clockNeedsCarrier = deciding.includes((plan.clock as CompleteClock).detector);
  const timing = lastTotal(clock) === null ? null : (lastTotal(clock) as number) ** 2;
  const bandwidth = lastBandwidth(carrier);
  return {
    bandwidthRatio: ratio(lastBandwidthHz(carrier), lastBandwidthHz(clock)),
    clockNeedsCarrier,
    // Every phase detector takes one sample at the strobe.
    carrierNeedsClock: true,
    startFirst: clockNeedsCarrier ? 'neither' : 'clock',
    carrierFromTimingDeg:
      timing === null || bandwidth === null ? null : phaseFromTiming(signal, timing, bandwidth) / radians,
    lossFromTimingDb: timing === null ? null : lossFromTiming(signal, timing),
    clockGainFromPhase: clockNeedsCarrier ? turnedGain(carrier) : 1,
  };
}

const lastTotal = ({ budget }: LoopDesign): number | null => budget?.stages.at(-1)?.total ?? null;
const lastBandwidth = ({ stages }: LoopDesign): number | null => stages.at(-1)?.noiseBandwidth.exact ?? null;
const lastBandwidthHz = ({ stages }: LoopDesign): number | null => stages.at(-1)?.noiseBandwidthHz.exact ?? null;
const ratio = (one: number | null, other: number | null): number | null =>
  one === null || !other ? null : one / other;

/**
 * Σ g′(k)² over the whole symbols k of a raised-cosine pulse: the power that data k symbols away put into a sample that is
 * late by a symbol, over that of the data. By Parseval's sum over the folded spectrum 2πf·G(f)
 *
 *     8π²·[(1 − α)³/24 + α³/24 − α²/π² + α/16]
 */
export const interferencePower = (rollOff: number): number =>
  8 * Math.PI ** 2 * (((1 - rollOff) ** 3 + rollOff ** 3) / 24 - rollOff ** 2 / Math.PI ** 2 + rollOff / 16);

/**
 * Phase jitter that slow timing jitter of variance σ² symbols² adds, radians rms: √(2·BnT·σ²·Σ g′(k)²). A late sample
 * holds σ·g′(k) of its neighbours; half of that power lies across the data, and because g′ is odd the errors of two
 * symbols that disturb each other agree, which doubles their spectrum at 0. None of it with data on one rail.
 */
function phaseFromTiming({ modulation, rollOff }: CompletePlan['signal'], variance: number, bandwidth: number): number {
  return modulation === 'BPSK' ? 0 : Math.sqrt(2 * bandwidth * variance * interferencePower(rollOff));
}

/**
 * Signal over noise that timing jitter costs, dB: the sample falls by ½|g″(0)|σ² with |g″(0)| = 4π²ξ (written as
 * e^(−2π²ξσ²), which stays above 0), and its neighbours
 * add σ²·Σ g′(k)² to a noise of 1/γ.
 */
function lossFromTiming({ rollOff, esN0Db }: CompletePlan['signal'], variance: number): number {
  // −20·log10 of e^−x, which would underflow for a loop that is far from locked.
  const exponent = 2 * Math.PI ** 2 * meanSquareBandwidth(rollOff) * variance;
  return (20 * exponent) / Math.LN10 + 10 * Math.log10(1 + 10 ** (esN0Db / 10) * variance * interferencePower(rollOff));
}

/** Mean cosine of a normal phase error: what a decided rail keeps of its slope. */
function turnedGain({ budget }: LoopDesign): number | null {
  const last = budget?.stages.at(-1);
  if (last?.total == null) return null;
  const standing = radians * (last.drift ?? 0);
  return Math.cos(standing) * Math.exp(-((radians * last.total) ** 2 - standing ** 2) / 2);
}
