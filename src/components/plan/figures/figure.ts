import type { StageDesign } from '../../../../shared/model/design';
import type { Axis, Limit, Marker, Path, Series, Tone } from '../../plot/plot-model';

export type Point = [number, number];

/** A plot as data: what KsPlot draws and the sentence that says what to read from it. */
export interface Figure {
  title: string;
  file: string;
  x: Axis;
  y: Axis;
  series: Series[];
  limits?: Limit[];
  markers?: Marker[];
  paths?: Path[];
  pathsOver?: string;
  caption: string;
}

/** The last stage is the one in use: copper; the first is blue; what lies between is soft. */
export function toneOf(index: number, count: number): Tone {
  if (index === count - 1) return 'track';
  return index === 0 ? 'acquire' : 'soft';
}

/** Pairs of two lists of a curve; points without a value are left out. */
export const pointsOf = (x: readonly number[], y: readonly (number | null)[]): Point[] =>
  x.flatMap((at, index): Point[] => {
    const value = y[index];
    return value === null || value === undefined ? [] : [[at, value]];
  });

/** “acquire 62.6° and track 64.9°”. */
export function eachStage(stages: readonly StageDesign[], say: (stage: StageDesign) => string): string {
  const parts = stages.map((stage) => `${stage.name} ${say(stage)}`);
  return parts.length < 2 ? parts.join('') : `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}`;
}

export const capital = (sentence: string): string => sentence.charAt(0).toUpperCase() + sentence.slice(1);
