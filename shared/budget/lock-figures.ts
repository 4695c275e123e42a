import type { LockFigures } from '../model/design';
import { lockStatistic } from '../detectors/lock-statistic';
import { tail } from '../math/gaussian-tail';
import type { CompleteCarrier, CompletePlan } from '../plan/complete';

export interface LockInput {
  plan: CompletePlan;
  carrier: CompleteCarrier;
  /** Jitter of the last stage, rad², and its noise bandwidth BnT per symbol. */
  jitterVariance: number;
  noiseBandwidth: number;
}

/**
 * The lock detector's statistic over a block and what its thresholds let through: a block is a sum of so many symbols
 * that it counts as normal, so a false alarm is Q(T/σu) and a miss Q((μ − T)/σl). T is cut to 1/256 as the words cut it.
 */
export function lockFigures({ plan, carrier, jitterVariance, noiseBandwidth }: LockInput): LockFigures {
  const { modulation, esN0Db, ringRatios, rollOff } = plan.signal;
  const { averagingSymbols, threshold } = carrier.lockDetector;
  const statistic = lockStatistic({
    modulation,
    esN0: 10 ** (esN0Db / 10),
    ringRatios,
    rollOff,
    jitterVariance,
    noiseBandwidth,
    averagingSymbols,
  });
  const { meanLocked, deviationLocked, deviationUnlocked } = statistic;
  const figures = (stage: string | null, wanted: number) => {
    const cut = Math.floor(256 * wanted) / 256;
    return {
      stage,
      threshold: wanted,
      falseAlarm: tail(cut / deviationUnlocked),
      miss: missed(meanLocked - cut, deviationLocked),
    };
  };
  const ofStages = carrier.stages.flatMap(({ name, until }) =>
    until?.lockMetric === undefined ? [] : [figures(name, until.lockMetric)],
  );
  return { averagingSymbols, ...statistic, thresholds: [...ofStages, figures(null, threshold)] };
}

/** A statistic that does not scatter is on one side or the other. */
const missed = (margin: number, deviation: number): number =>
  deviation > 0 ? tail(margin / deviation) : Number(margin < 0);
