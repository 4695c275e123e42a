import type { Finding, StageJitter } from '../model/design';
import { detectorFindings } from './detector';
import { phaseJitterFindings } from './phase-jitter';
import { lossFindings } from './losses';
import { finding, passed, remedyUnless, say } from './finding';
import type { Severity } from './finding';
import { bandwidthPointer, lastStage, pointerOf, stageName } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { narrowerWithin } from './swept';

/** Share of the timing limit that the data's own pattern may take: a quarter of the variance. */
const patternShare = 0.5;
/** Loop signal-to-noise ratios below which slips are to be counted with, and below which nothing holds, dB. */
const quietLoopDb = 10;
const holdingLoopDb = 6;

/** Jitter of the last stage, and what it does to lock and decisions. */
export const noiseFindings = (view: LoopView): Finding[] => [
  ...phaseJitterFindings(view),
  ...timingJitter(view),
  ...patternNoise(view),
  ...cycleSlips(view),
  ...lossFindings(view),
  ...detectorFindings(view),
];

/** The jitter of the last stage of a clock loop, where this engine has a budget for it. */
function timingOf(view: LoopView): { at: StageView; jitter: StageJitter; limit: number } | null {
  const at = lastStage(view);
  const jitter = view.design.budget?.stages[at.index];
  return view.key === 'clock' && jitter ? { at, jitter, limit: view.plan.limits.timingJitterSymbols } : null;
}

function timingJitter(view: LoopView): Finding[] {
  const timing = timingOf(view);
  if (!timing || timing.jitter.total === null) return [];
  const { at, jitter, limit } = timing;
  const total = timing.jitter.total;
  const severity: Severity = total > limit ? 'fail' : 'pass';
  return [
    finding({
      slug: 'noise.timing-total',
      severity,
      title: passed(severity, 'Timing jitter keeps its limit', 'The strobe jitters too much'),
      value: total,
      limit,
      sense: 'max',
      unit: 'symbols rms',
      reason: `${stageName(at)}: ${timingParts(jitter)}, together ${say(total)} of ${say(limit)} symbols (5.2).`,
      ...remedyUnless(
        severity,
        () =>
          narrowerWithin(at, 'total', limit) ?? {
            remedy: `No bandwidth keeps the limit: ${otherMeans}.`,
            change: null,
          },
      ),
      fields: [bandwidthPointer(at), '/limits/timingJitterSymbols', '/signal/esN0Db'],
      source: 'error spectrum of the detector through the loop',
    }),
  ];
}

const otherMeans = 'raise 1.5, take another detector (3.1), or allow more (5.2)';

const timingParts = ({ thermal, selfNoise }: StageJitter): string =>
  `thermal ${say(thermal ?? 0)}, pattern ${say(selfNoise ?? 0)}`;

function patternNoise(view: LoopView): Finding[] {
  const timing = timingOf(view);
  if (!timing || timing.jitter.selfNoise === null) return [];
  const { at } = timing;
  const value = timing.jitter.selfNoise;
  const limit = patternShare * timing.limit;
  const severity: Severity = value > limit ? 'caution' : 'pass';
  return [
    finding({
      slug: 'clock.pattern-noise',
      severity,
      title: passed(severity, 'Pattern noise leaves room', 'Pattern noise takes the timing limit'),
      value,
      limit,
      sense: 'max',
      unit: 'symbols rms',
      reason: `The data itself moves the strobe by ${say(value)} symbols rms, whatever the signal’s strength; half of 5.2 is ${say(limit)}.`,
      ...remedyUnless(
        severity,
        () =>
          narrowerWithin(at, 'selfNoise', limit) ?? {
            remedy: 'Take a wider roll-off, or zero-crossing (3.1).',
            change: null,
          },
      ),
      fields: [bandwidthPointer(at), pointerOf(view, 'detector'), '/signal/rollOff'],
      source: 'error of the detector without noise through the loop; half of the limit is common practice',
    }),
  ];
}

function cycleSlips(view: LoopView): Finding[] {
  const slip = view.design.budget?.slip;
  if (!slip) return [];
  const at = lastStage(view);
  const value = 10 * Math.log10(slip.rho);
  const severity: Severity = value < holdingLoopDb ? 'fail' : value < quietLoopDb ? 'caution' : 'pass';
  return [
    finding({
      slug: 'noise.cycle-slip',
      severity,
      title: passed(severity, `${view.title} hardly slips`, `${view.title} slips cycles`),
      value,
      limit: quietLoopDb,
      sense: 'min',
      unit: 'dB',
      reason: `${stageName(at)} has a loop signal-to-noise ratio of ${say(value)} dB${slipTime(slip.symbols)}. A slip turns or shifts all that follows.`,
      ...remedyUnless(severity, () => slipRemedy(at, slip.rho)),
      fields: [bandwidthPointer(at), '/signal/esN0Db'],
      source: 'A. Viterbi 1966; 10 dB is common practice',
      estimate: true,
    }),
  ];
}

/** A loop of order 2 slips up to four times sooner than the formula of order 1 says. */
const slipTime = (symbols: number | null): string =>
  symbols === null || symbols > 1e15 ? '' : `: a slip about every ${say(symbols / 4)} to ${say(symbols)} symbols`;

/** The ratio goes with the variance upside down. */
function slipRemedy(at: StageView, rho: number) {
  const total = at.design.budget?.stages[at.index]?.total ?? null;
  const within = total === null ? null : narrowerWithin(at, 'total', total * Math.sqrt(rho / 10 ** (quietLoopDb / 10)));
  return (
    within ?? { remedy: 'No bandwidth makes slips rare: raise 1.5, or take a detector with less loss.', change: null }
  );
}
