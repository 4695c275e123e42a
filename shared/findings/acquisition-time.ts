import type { Finding, StageTime } from '../model/design';
import { fieldNumber } from '../plan/fields';
import { finding, passed, remedyUnless, say, setTo, twoDigitsUp } from './finding';
import type { Remedy, Severity } from './finding';
import { pointerOf } from './loop-view';
import type { LoopView } from './loop-view';

/** When the stages of a loop are left. One stage alone is a matter of its pull-in. */
export const acquisitionTimeFindings = (view: LoopView): Finding[] =>
  view.loop.stages.length > 1 ? [...stageTime(view), ...lastStageStart(view)] : [];

const untilPointer = (view: LoopView, index: number): string => pointerOf(view, `stages/${index}/until/symbols`);

/** The stage that its count leaves soonest for what it needs; pull-in takes the first stage's settling with it. */
function stageTime(view: LoopView): Finding[] {
  const counted = view.design.acquisition.stages.flatMap(({ untilSymbols, neededSymbols }, index) =>
    untilSymbols === null || neededSymbols === null ? [] : [{ index, until: untilSymbols, needed: neededSymbols }],
  );
  const worst = counted.sort((a, b) => a.until / a.needed - b.until / b.needed)[0];
  if (!worst) return [];
  const { index, until, needed } = worst;
  const severity: Severity = until < needed ? 'caution' : 'pass';
  const pointer = untilPointer(view, index);
  const name = (view.design.stages[index] as { name: string }).name;
  return [
    finding({
      slug: 'acquisition.stage-time',
      severity,
      title: passed(severity, `${view.title}: stages run long enough`, `${view.title} leaves a stage early`),
      value: until,
      limit: Math.ceil(needed),
      sense: 'min',
      unit: 'symbols',
      reason: `Stage ${name} ends after ${say(until, 6)} symbols (${fieldNumber(pointer)}); it needs about ${say(needed)} to settle. The next stage then starts outside its own lock-in range.`,
      ...remedyUnless(severity, () => untilSettled(pointer, name, needed)),
      fields: [pointer],
      source: '2 % settling of a phase step, and pull-in of the first stage',
      estimate: true,
    }),
  ];
}

function untilSettled(pointer: string, stage: string, needed: number): Remedy {
  const value = Math.ceil(twoDigitsUp(needed));
  return setTo(`${fieldNumber(pointer)} of ${stage}`, pointer, value, `${say(value, 6)} symbols`);
}

/** Nothing of the last stage is counted: it takes over a loop that is locked already. */
function lastStageStart(view: LoopView): Finding[] {
  const { totalSymbols, stages } = view.design.acquisition;
  const last = stages.at(-1)?.neededSymbols ?? null;
  if (totalSymbols === null || last === null) return [];
  const limit = view.plan.limits.acquisitionSymbols;
  const value = Math.round(totalSymbols - last);
  const severity: Severity = value > limit ? 'caution' : 'pass';
  return [
    finding({
      slug: 'acquisition.total-time',
      severity,
      title: passed(severity, `${view.title} tracks in time`, `${view.title} starts to track late`),
      value,
      limit,
      sense: 'max',
      unit: 'symbols',
      reason: `The last stage takes over after about ${say(value, 6)} symbols; 5.6 allows ${say(limit, 6)}. Until then the jitter is that of a wider loop.`,
      ...remedyUnless(severity, () => shorterStage(view, stages, value - limit)),
      fields: ['/limits/acquisitionSymbols', pointerOf(view, 'stages')],
      source: 'counts and estimates of the stages together',
      estimate: true,
    }),
  ];
}

/** Takes what is too much off a stage that does not need it. */
function shorterStage(view: LoopView, stages: readonly StageTime[], tooMuch: number): Remedy {
  const index = stages.findIndex(
    ({ untilSymbols, neededSymbols }) =>
      untilSymbols !== null && neededSymbols !== null && untilSymbols - tooMuch >= neededSymbols,
  );
  const stage = stages[index];
  if (!stage) return { remedy: 'Widen the first stage, or allow more symbols (5.6).', change: null };
  const pointer = untilPointer(view, index);
  const value = (stage.untilSymbols as number) - tooMuch;
  return setTo(`${fieldNumber(pointer)} of ${stage.stage}`, pointer, value, `${say(value, 6)} symbols`);
}
