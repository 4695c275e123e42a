import type { LoopDesign, StageDesign } from '../../../../shared/model/design';
import { numberText } from '../../../../shared/quantities/format';
import { eachStage, pointsOf, toneOf, type Figure } from './figure';
import type { Marker } from '../../plot/plot-model';

/** Fig. 6: what more delay would cost these gains. */
export function marginFigure({ stages }: LoopDesign, delay: number, limitDeg: number): Figure {
  return {
    title: 'Phase margin, °',
    file: 'margin',
    x: { label: 'extra delay', unit: 'updates', domain: [0, reach(stages, delay, limitDeg)] },
    y: { label: 'margin', domain: [0, 75], ticks: [0, 15, 30, 45, 60], zero: true },
    series: stages.map(({ name, marginAgainstDelay }, index) => ({
      label: name,
      tone: toneOf(index, stages.length),
      points: pointsOf(marginAgainstDelay.delay, marginAgainstDelay.phaseDeg).filter(([, margin]) => margin >= 0),
    })),
    limits: [{ at: limitDeg, label: `limit ${numberText(limitDeg)}` }],
    markers: stages.flatMap((stage, index) => here(stage, delay, toneOf(index, stages.length))),
    caption: captionOf(stages, delay, limitDeg),
  };
}

/** As far as the worst stage comes to its limit and a little beyond, never shorter than the plan's own delay. */
function reach(stages: readonly StageDesign[], delay: number, limitDeg: number): number {
  const most = Math.max(...stages.flatMap(({ marginAgainstDelay }) => marginAgainstDelay.delay), delay + 1);
  const ends = stages.map((stage) => keepsUpTo(stage, limitDeg)).filter((end) => end !== undefined);
  const wanted = ends.length > 0 ? 1.6 * Math.min(...ends) : most;
  return Math.min(most, Math.max(wanted, 1.5 * delay, 8));
}

/** A margin below 0 lies outside the plot: the caption says it. */
const here = ({ margins }: StageDesign, delay: number, tone: Marker['tone']): Marker[] =>
  margins.phaseDeg === null || margins.phaseDeg < 0 ? [] : [{ x: delay, y: margins.phaseDeg, tone, hollow: true }];

/** The largest delay of the curve at which the margin is still held; undefined when none is, or all are. */
export function keepsUpTo({ marginAgainstDelay }: Pick<StageDesign, 'marginAgainstDelay'>, limitDeg: number) {
  const { delay, phaseDeg } = marginAgainstDelay;
  const short = phaseDeg.findIndex((margin) => margin === null || margin < limitDeg);
  return short < 1 ? undefined : delay[short - 1];
}

function captionOf(stages: readonly StageDesign[], delay: number, limitDeg: number): string {
  const margins = eachStage(stages, ({ margins }) =>
    margins.phaseDeg === null ? 'none' : `${numberText(margins.phaseDeg, { decimals: 1 })}°`,
  );
  const first = stages
    .map((stage) => ({ name: stage.name, end: keepsUpTo(stage, limitDeg) }))
    .filter(({ end }) => end !== undefined)
    .sort((one, other) => one.end! - other.end!)[0];
  const end = first ? ` ${first.name} keeps ${numberText(limitDeg)}° up to delay ${first.end}.` : '';
  return `At delay ${delay} the margins are: ${margins}.${end.replace(/^ ./, (start) => start.toUpperCase())}`;
}
