import type { LoopDesign, StageDesign } from '../../../../shared/model/design';
import { numberText } from '../../../../shared/quantities/format';
import { capital, eachStage, pointsOf, toneOf, type Figure, type Point } from './figure';
import type { Marker } from '../../plot/plot-model';

/** Fig. 1: the answer of the NCO phase (of the strobe, in a clock loop) to a phase step. */
export function stepFigure({ stages }: LoopDesign): Figure {
  const last = Math.max(...stages.map(endOf));
  return {
    title: 'Response to a phase step',
    file: 'phase-step',
    x: { label: 'time', unit: 'updates', domain: [0, last] },
    y: { label: 'phase', zero: true },
    series: stages.map((stage, index) => ({
      label: stage.name,
      tone: toneOf(index, stages.length),
      points: curveUpTo(stage, last),
      quiet: stage.settlingUpdates !== null,
    })),
    markers: stages.flatMap((stage, index) => settled(stage, toneOf(index, stages.length))),
    caption: captionOf(stages),
  };
}

/** The curve as far as the plot goes; one that was over before goes on at 1, from which it differs by a few parts in a thousand at most. */
function curveUpTo({ phaseStep, settlingUpdates }: StageDesign, last: number): Point[] {
  const points = pointsOf(phaseStep.updates, phaseStep.phase);
  const end = points.at(-1)?.[0] ?? last;
  const goesOn: Point[] = settlingUpdates !== null && end < last ? [[last, 1]] : [];
  return [...points.filter(([at]) => at <= last), ...goesOn];
}

/** Where the plot may end: a little past settling, or where the curve ends when it never settles. */
const endOf = ({ settlingUpdates, phaseStep }: StageDesign): number =>
  settlingUpdates === null ? (phaseStep.updates.at(-1) ?? 1) : 1.12 * settlingUpdates;

function settled(stage: StageDesign, tone: Marker['tone']): Marker[] {
  const { settlingUpdates: x, name } = stage;
  return x === null ? [] : [{ x, y: phaseAt(stage, x), tone, label: `${name} ${numberText(x)}` }];
}

function phaseAt({ phaseStep }: StageDesign, update: number): number {
  const after = phaseStep.updates.findIndex((at) => at >= update);
  return phaseStep.phase[after] ?? 1;
}

function captionOf(stages: readonly StageDesign[]): string {
  const settles = eachStage(stages, ({ settlingUpdates }) =>
    settlingUpdates === null ? 'never settles' : `is within 2 % after ${numberText(settlingUpdates)}`,
  );
  const overshoots = stages.map(({ overshoot }) => (overshoot === null ? 'none' : `${Math.round(100 * overshoot)} %`));
  const overshoot = new Set(overshoots).size === 1 ? overshoots[0] : overshoots.join(' and ');
  return `${capital(settles)} updates; overshoot ${overshoot}.`;
}
