import type { LoopDesign, StageDesign } from '../../../../shared/model/design';
import { numberText } from '../../../../shared/quantities/format';
import { toneOf, type Figure, type Point } from './figure';
import type { Marker, Path, Series } from '../../plot/plot-model';

type Pole = StageDesign['poles'][number];

const real = (pole: Pole): number => pole[0]!;
const imaginary = (pole: Pole): number => pole[1]!;
const magnitude = (pole: Pole): number => Math.hypot(real(pole), imaginary(pole));
const distance = (pole: Pole): number => Math.hypot(real(pole) - 1, imaginary(pole));

/** Fig. 3: the closed-loop poles near z = 1, where the loop's own ones lie; the delay's are farther in. */
export function poleFigure({ stages }: LoopDesign): Figure {
  const near = stages.map(nearPoles);
  const reach = Math.max(1e-9, ...near.flat().map(distance));
  const x: [number, number] = [1 - 1.35 * reach, 1 + 0.3 * reach];
  const y: [number, number] = [-1.2 * reach, 1.2 * reach];
  return {
    title: 'Closed-loop poles near z = 1, root locus over the gain',
    file: 'poles',
    x: { label: 'Re z', domain: x },
    y: { label: 'Im z', domain: y },
    series: circle(y),
    paths: locus(stages.at(-1)!),
    pathsOver: 'gain over this one',
    markers: stages.flatMap(({ name }, index) => crosses(near[index]!, name, toneOf(index, stages.length))),
    caption: captionOf(stages, near),
  };
}

/** How the poles of the last stage move while its gain changes: one line a branch. */
function locus({ rootLocus: { ratio, poles } }: StageDesign): Path[] {
  const branches = poles[0]?.length ?? 0;
  return Array.from({ length: branches }, (_, branch) => ({
    label: `branch ${branch + 1}`,
    tone: 'soft' as const,
    points: poles.map((row): Point => [real(row[branch]!), imaginary(row[branch]!)]),
    along: ratio,
  }));
}

/** The poles that the loop has without its delay: as many as its order, the nearest to z = 1. */
function nearPoles({ poles, analogPoles }: StageDesign): Pole[] {
  return [...poles].sort((one, other) => distance(one) - distance(other)).slice(0, Math.max(1, analogPoles.length));
}

const crosses = (poles: readonly Pole[], name: string, tone: Marker['tone']): Marker[] =>
  poles.map((pole) => ({
    ...{ x: real(pole), y: imaginary(pole), tone, shape: 'cross' as const },
    ...(pole === uppermost(poles) && { label: name }),
  }));

const uppermost = (poles: readonly Pole[]): Pole | undefined =>
  [...poles].sort((one, other) => imaginary(other) - imaginary(one))[0];

/** The circle in two halves, each from left to right. */
function circle([low, high]: [number, number]): Series[] {
  const top = Math.min(1, high, -low);
  const half = Array.from({ length: 41 }, (_, step): Point => {
    const y = top * (1 - step / 40);
    return [Math.sqrt(1 - y * y), y];
  });
  const style = { label: 'unit circle', tone: 'ink', thin: true } as const;
  return [
    { ...style, points: half.map(([x, y]): Point => [x, -y]) },
    { ...style, label: '', quiet: true, points: half },
  ];
}

function captionOf(stages: readonly StageDesign[], near: readonly Pole[][]): string {
  const all = stages.flatMap(({ poles }) => poles);
  const outside = all.filter((pole) => magnitude(pole) >= 1).length;
  const largest = numberText(Math.max(...all.map(magnitude)), { decimals: 4 });
  const rest = Math.max(...stages.map(({ poles }, index) => poles.length - near[index]!.length));
  const delay = rest > 0 ? `; ${rest} more of each stage, nearer 0, come from the delay` : '';
  return outside > 0
    ? `${outside} of ${all.length} poles lie on or outside the circle: the loop is unstable.`
    : `All poles lie inside the circle, the largest magnitude is ${largest}${delay}.${ends(stages.at(-1)!)}`;
}

/** What the root locus of the last stage says. */
function ends({ name, rootLocus: { critical, ratio } }: StageDesign): string {
  const up = critical.find((value) => value > 1);
  if (ratio.length === 0) return '';
  return up === undefined
    ? ` Soft lines: ${name} while its gain changes; no gain makes it unstable.`
    : ` Soft lines: ${name} while its gain changes; at ${numberText(up, { significant: 3 })} times its gain a pole reaches the circle.`;
}
