import type { LoopDesign, StageDesign } from '../../../../shared/model/design';
import { quantityText } from '../../../../shared/quantities/format';
import { eachStage, pointsOf, toneOf, type Figure } from './figure';
import type { Series } from '../../plot/plot-model';

const floorDb = -60;

/** Fig. 2: what the loop follows (H) and what it passes on (E), over frequency. */
export function responseFigure({ stages }: LoopDesign): Figure {
  return {
    title: '|H| and |E|, dB',
    file: 'response',
    x: { label: 'frequency', unit: 'Hz', scale: 'log' },
    y: { label: 'magnitude, dB', domain: [floorDb, 10], ticks: [-60, -40, -20, 0] },
    series: stages.flatMap((stage, index) => curves(stage, toneOf(index, stages.length))),
    caption: captionOf(stages),
  };
}

function curves({ name, response }: StageDesign, tone: Series['tone']): Series[] {
  const over = (values: readonly (number | null)[]) => pointsOf(response.frequencyHz, values);
  return [
    { label: `H ${name}`, tone, points: over(response.hDb) },
    { label: `E ${name}`, tone, points: over(response.eDb), dash: true },
  ];
}

function captionOf(stages: readonly StageDesign[]): string {
  const crossing = eachStage(stages, (stage) => {
    const at = crossingHz(stage);
    return at === undefined ? 'has no crossing' : `below ${quantityText(at, { unit: 'Hz', significant: 3 })}`;
  });
  return `Phase noise below the crossing of H and E is followed, above it passed on: ${crossing}.`;
}

/** The lowest frequency at which |E| reaches |H|, on the log axis between two points of the curve. */
export function crossingHz({ response }: Pick<StageDesign, 'response'>): number | undefined {
  const { frequencyHz, hDb, eDb } = response;
  const gaps = frequencyHz.map((_, index) => (hDb[index] ?? NaN) - (eDb[index] ?? NaN));
  const after = gaps.findIndex((gap, index) => index > 0 && gap <= 0 && (gaps[index - 1] ?? 0) > 0);
  if (after < 1) return undefined;
  const [from, to] = [frequencyHz[after - 1]!, frequencyHz[after]!];
  const share = gaps[after - 1]! / (gaps[after - 1]! - gaps[after]!);
  return from * (to / from) ** share;
}
