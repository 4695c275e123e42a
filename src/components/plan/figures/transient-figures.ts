import type { Curve, LoopDesign, StageDesign } from '../../../../shared/model/design';
import { numberText, quantityText } from '../../../../shared/quantities/format';
import { capital, eachStage, toneOf, type Figure, type Point } from './figure';
import type { LoopKind } from './s-curve-figure';

const degrees = 180 / Math.PI;

/** How a frequency becomes a phase per update, and a phase what is drawn. */
interface InputScale {
  /** Radians (symbols) per update of one Hz (ppm), or per update² of one Hz/s (ppm/s). */
  perUnit: number;
  /** Drawn unit per radian (symbol). */
  drawn: number;
  drawnUnit: string;
}

/** Fig. 7: the error that a step of the frequency leaves until the integrator has learnt it. */
export function frequencyStepFigure(loop: LoopDesign, kind: LoopKind, symbolRateBd: number): Figure | undefined {
  const scale = stepScale(loop, kind, symbolRateBd);
  const size = roundSize(
    loop.stages.map(({ frequencyStep }) => frequencyStep),
    scale,
  );
  if (size === undefined) return undefined;
  const text = sizeText(size, kind === 'carrier' ? 'Hz' : 'ppm');
  return {
    ...errorFigure(loop, ({ frequencyStep }) => frequencyStep, size, scale),
    title: `Error after a frequency step of ${text}, ${scale.drawnUnit}`,
    file: 'frequency-step',
    caption: `${peaks(loop, ({ frequencyStep }) => frequencyStep, size, scale)} The linear loop: it holds while the error stays near lock.`,
  };
}

/** Fig. 8: the error while the frequency drifts. */
export function frequencyRampFigure(loop: LoopDesign, kind: LoopKind, symbolRateBd: number): Figure | undefined {
  const step = stepScale(loop, kind, symbolRateBd);
  const scale = { ...step, perUnit: step.perUnit / loop.updateRateHz };
  const size = roundSize(
    loop.stages.map(({ frequencyRamp }) => frequencyRamp),
    scale,
  );
  if (size === undefined) return undefined;
  const text = sizeText(size, kind === 'carrier' ? 'Hz/s' : 'ppm/s');
  return {
    ...errorFigure(loop, ({ frequencyRamp }) => frequencyRamp, size, scale),
    title: `Error under a drift of ${text}, ${scale.drawnUnit}`,
    file: 'frequency-ramp',
    caption: `${capital(eachStage(loop.stages, ({ frequencyRamp }) => standing(frequencyRamp, size, scale)))}.`,
  };
}

function stepScale({ updateRateHz }: LoopDesign, kind: LoopKind, symbolRateBd: number): InputScale {
  if (kind === 'carrier') return { perUnit: (2 * Math.PI) / updateRateHz, drawn: degrees, drawnUnit: '°' };
  return { perUnit: (1e-6 * symbolRateBd) / updateRateHz, drawn: 1, drawnUnit: 'symbols' };
}

type Read = (stage: StageDesign) => Curve | null;

/** The power of ten whose largest error is between 1 and 10 degrees, or 0.001 and 0.01 symbols. */
function roundSize(curves: readonly (Curve | null)[], { perUnit, drawn, drawnUnit }: InputScale): number | undefined {
  const most = Math.max(0, ...curves.map((curve) => curve?.peak ?? 0));
  if (!(most > 0)) return undefined;
  const wanted = drawnUnit === '°' ? 10 : 0.01;
  return 10 ** Math.floor(Math.log10(wanted / (most * perUnit * drawn)));
}

const sizeText = (size: number, unit: string): string =>
  unit.startsWith('Hz') ? quantityText(size, { unit: 'Hz' }) + unit.slice(2) : `${numberText(size)} ${unit}`;

function errorFigure(
  { stages }: LoopDesign,
  read: Read,
  size: number,
  scale: InputScale,
): Omit<Figure, 'title' | 'file' | 'caption'> {
  const factor = size * scale.perUnit * scale.drawn;
  const last = Math.max(...stages.map((stage) => 1.12 * (stage.settlingUpdates ?? read(stage)?.updates.at(-1) ?? 1)));
  return {
    x: { label: 'time', unit: 'updates', domain: [0, last] },
    y: { label: 'error', zero: true },
    series: stages.flatMap((stage, index) => {
      const curve = read(stage);
      if (!curve) return [];
      const points = curve.updates
        .map((at, i): Point => [at, factor * curve.value[i]!])
        .filter(([at], i) => at <= last || (curve.updates[i - 1] ?? 0) < last);
      // A curve that was over before goes on where it ends; one that runs on is cut where the plot ends.
      const over = curve.updates.at(-1)! < last;
      const goesOn: Point[] = curve.settled !== null && over ? [[last, factor * curve.settled]] : [];
      return [{ label: stage.name, tone: toneOf(index, stages.length), points: [...points, ...goesOn] }];
    }),
  };
}

const errorText = (value: number, { drawnUnit }: InputScale): string =>
  `${numberText(value, { significant: 3 })}${drawnUnit === '°' ? '°' : ` ${drawnUnit}`}`;

function peaks({ stages }: LoopDesign, read: Read, size: number, scale: InputScale): string {
  const factor = size * scale.perUnit * scale.drawn;
  const each = eachStage(stages, (stage) => {
    const curve = read(stage);
    return curve
      ? `is off by at most ${errorText(factor * curve.peak, scale)} after ${numberText(curve.peakUpdates)} updates`
      : 'has none';
  });
  return `${capital(each)}.`;
}

function standing(curve: Curve | null, size: number, scale: InputScale): string {
  if (!curve) return 'has none';
  if (curve.settled === null) return 'falls behind without end';
  if (curve.settled === 0) return 'comes back to 0';
  return `stays ${errorText(size * scale.perUnit * scale.drawn * curve.settled, scale)} behind`;
}
