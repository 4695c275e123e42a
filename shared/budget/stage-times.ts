import type { Acquisition, StageDesign } from '../model/design';
import type { CompleteCarrier, CompleteClock, CompleteStage } from '../plan/complete';

export interface StageTimesInput {
  loop: Pick<CompleteCarrier | CompleteClock, 'updateInterval' | 'stages' | 'lockDetector'>;
  stages: StageDesign[];
  /** Estimate for the first stage; null where it does not pull in, or from an unknown offset. */
  pullInSymbols: number | null;
}

type Times = Pick<Acquisition, 'settlingSymbols' | 'totalSymbols' | 'stages'>;

/**
 * How long acquisition takes. The first stage needs its pull-in and its settling, any later one its settling. A stage is
 * left when its count of symbols ends, or by the first block in lock after it has settled, whichever comes first; the
 * last one has to settle.
 */
export function acquisitionTime({ loop, stages, pullInSymbols }: StageTimesInput): Times {
  const settling = stages.map(({ settlingUpdates }) =>
    settlingUpdates === null ? null : settlingUpdates * loop.updateInterval,
  );
  const needed = settling.map((symbols, i) => sum(symbols, i === 0 ? pullInSymbols : 0));
  return {
    settlingSymbols: settling[0] as number | null,
    totalSymbols: totalOf(loop, needed),
    stages: stages.map(({ name }, i) => ({
      stage: name,
      untilSymbols: loop.stages[i]?.until?.symbols ?? null,
      neededSymbols: needed[i] as number | null,
    })),
  };
}

const sum = (one: number | null, other: number | null): number | null =>
  one === null || other === null ? null : one + other;

/** Null where a stage is left before it has done its part, or is never left by anything that is planned. */
function totalOf(loop: StageTimesInput['loop'], needed: (number | null)[]): number | null {
  return needed.reduce<number | null>((total, symbols, i) => {
    if (symbols === null) return null;
    const stage = loop.stages[i] as CompleteStage;
    return sum(
      total,
      i === needed.length - 1 ? symbols : leftAfter(stage, symbols, loop.lockDetector.averagingSymbols),
    );
  }, 0);
}

function leftAfter({ until }: CompleteStage, needed: number, block: number): number | null {
  const ends = [];
  if (until?.symbols !== undefined) ends.push(until.symbols);
  // Blocks are not restarted: the one in which the loop settles may fail, the next one is whole.
  if (until?.lockMetric !== undefined) ends.push(block * (Math.ceil(needed / block) + 1));
  const end = Math.min(...ends);
  return Number.isFinite(end) && end >= needed ? end : null;
}
