import type { StageDesign, StageWords } from '../model/design';
import type { StageGainWords, StoredInteger } from '../model/words';
import type { CompleteCarrier, CompleteClock } from '../plan/complete';
import { toNumber } from '../fixed-point/format';
import { ParameterError } from '../parameter-error';
import type { AmplitudeError } from '../loop/amplitude-ends';
import { linearLoop } from '../loop/linear-loop';
import type { LoopGains } from '../loop/linear-loop';
import { stageDesign } from '../loop/stage-design';
import { averagedSymbols, stageLoop } from '../loop/stage-loop';
import type { StageLoop, WantedLoop } from '../loop/stage-loop';

type PlannedLoop = CompleteCarrier | CompleteClock;

/** The stages of one loop, unquantised. */
export interface SolvedStages {
  wanted: WantedLoop[];
  solved: StageLoop[];
}

/** @param key where the loop stands in the plan */
export function solveStages(key: 'carrier' | 'clock', loop: PlannedLoop, symbolRateBd: number): SolvedStages {
  const wanted = loop.stages.map((stage, i): WantedLoop => ({
    pointer: `/${key}/stages/${i}`,
    stage,
    loop,
    symbolRateBd,
  }));
  return { wanted, solved: wanted.map(stageLoop) };
}

/** What the words of a loop need of its stages. */
export const wordStages = ({ wanted, solved }: SolvedStages) =>
  wanted.map(({ stage }, i) => ({
    ...(solved[i] as StageLoop).loop.gains,
    untilSymbols: stage.until?.symbols ?? null,
    lockThreshold: stage.until?.lockMetric ?? null,
  }));

/** @throws {ParameterError} when a limit is so small that its word is 0, which would hold the integrator still */
export function requireLimit({ integratorLimit }: { integratorLimit: StoredInteger | null }, pointer: string): void {
  if (integratorLimit === null || toNumber(integratorLimit) > 0) return;
  throw new ParameterError(pointer, 'the limit is less than one integrator LSB; raise it or add guard bits');
}

export interface StageDesignsInput {
  stages: SolvedStages;
  loop: PlannedLoop;
  words: StageGainWords[];
  /** Gains that the words make, one entry a stage. */
  effective: LoopGains[];
  perUnit: number;
  updateRateHz: number;
  /** What the gain control leaves open, with the detector's answer to it. */
  amplitude: AmplitudeError;
}

/** Every stage of one loop worked out. */
export function stageDesigns({
  stages,
  loop,
  words,
  effective,
  perUnit,
  updateRateHz,
  amplitude,
}: StageDesignsInput): StageDesign[] {
  const averaged = averagedSymbols(loop.updateInterval);
  return stages.wanted.map((wanted, i) =>
    stageDesign({
      wanted,
      solved: stages.solved[i] as StageLoop,
      effective: linearLoop({ gains: upright(effective[i] as LoopGains, loop.polarity), delay: loop.delay, averaged }),
      words: stageWords(words[i] as StageGainWords, loop.order),
      perUnit,
      updateRateHz,
      amplitude,
    }),
  );
}

/** A loop of polarity −1 has negated words, and hardware that negates them again. */
const upright = ({ g1, g2, g3 }: LoopGains, polarity: number): LoopGains => ({
  g1: polarity * g1,
  g2: polarity * g2,
  g3: polarity * g3,
});

const stageWords = ({ proportional, integral, integral2 }: StageGainWords, order: number): StageWords =>
  order === 3 ? { proportional, integral, integral2 } : { proportional, integral };
