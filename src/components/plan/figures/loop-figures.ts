import type { Design, LoopDesign } from '../../../../shared/model/design';
import { settled } from '../../../../shared/plan/changes';
import type { Figure } from './figure';
import { bandwidthFigure } from './bandwidth-figure';
import { interpolatorFigure } from './interpolator-figure';
import { jitterFigure } from './jitter-figure';
import { marginFigure } from './margin-figure';
import { poleFigure } from './pole-figure';
import { responseFigure } from './response-figure';
import { sCurveFigure, type LoopKind } from './s-curve-figure';
import { stepFigure } from './step-figure';
import { frequencyRampFigure, frequencyStepFigure } from './transient-figures';

export interface NumberedFigure extends Figure {
  figure: number;
}

/**
 * The figures of one loop. A figure that the engine cannot fill yet leaves its number free, so that “Fig. 5” is
 * the same figure on every sheet.
 */
export function loopFigures(design: Design, kind: LoopKind): NumberedFigure[] {
  const loop = design[kind];
  if (!loop) return [];
  const read = (pointer: string): number => settled(design.plan, pointer) as number;
  const limits = {
    phaseJitterDeg: read('/limits/phaseJitterDeg'),
    timingJitterSymbols: read('/limits/timingJitterSymbols'),
  };
  const figures = [
    stepFigure(loop),
    responseFigure(loop),
    poleFigure(loop),
    sCurveFigure(loop, kind, read('/signal/esN0Db')),
    jitterFigure(loop, limits),
    marginFigure(loop, read(`/${kind}/delay`), read('/limits/phaseMarginDeg')),
    frequencyStepFigure(loop, kind, read('/signal/symbolRateBd')),
    frequencyRampFigure(loop, kind, read('/signal/symbolRateBd')),
    bandwidthFigure(loop, read(`/${kind}/delay`)),
    interpolatorFigure(loop),
  ];
  return figures.flatMap((figure, index) => (figure && hasCurve(figure) ? [{ ...figure, figure: index + 1 }] : []));
}

/** An unstable loop has no response to draw. */
const hasCurve = ({ series }: Figure): boolean => series.some(({ points }) => points.length > 1);

/** What to read where figures are left out because no stage of the loop is stable; undefined while one is. */
export const missingFigures = ({ stages }: LoopDesign): string | undefined =>
  stages.some(({ stable }) => stable)
    ? undefined
    : 'An unstable loop has no response and no jitter: Fig. 1, 2, 5, 7 and 8 are left out.';
