import type { Budget, LoopDesign } from '../../../../shared/model/design';
import { numberText } from '../../../../shared/quantities/format';
import { pointsOf, toneOf, type Figure } from './figure';
import type { Marker, Series } from '../../plot/plot-model';

export interface JitterLimits {
  phaseJitterDeg: number;
  timingJitterSymbols: number;
}

/** Fig. 5: what noise and the oscillator add up to over the bandwidth; undefined where the engine has no budget. */
export function jitterFigure({ budget, stages }: LoopDesign, limits: JitterLimits): Figure | undefined {
  if (!budget) return undefined;
  const limit = budget.unit === 'deg' ? limits.phaseJitterDeg : limits.timingJitterSymbols;
  const asked = stages.map(({ noiseBandwidth }) => noiseBandwidth.wanted);
  return {
    title: budget.unit === 'deg' ? 'Phase jitter, ° rms' : 'Timing jitter, symbols rms',
    file: 'jitter',
    x: { label: 'asked BnT', scale: 'log' },
    y: { label: 'jitter', domain: [0, ceiling(budget, limit)], zero: true },
    series: curves(budget),
    limits: [{ at: limit, label: `limit ${jitterText(limit, budget)}` }],
    markers: [...marks(budget, asked), ...least(budget)],
    caption: captionOf(budget, limit),
  };
}

const digitsOf = ({ unit }: Budget): number => (unit === 'deg' ? 2 : 4);
const jitterText = (value: number, budget: Budget): string => numberText(value, { decimals: digitsOf(budget) });
const withUnit = (value: number, budget: Budget): string =>
  `${jitterText(value, budget)}${budget.unit === 'deg' ? '°' : ' symbols'}`;

/** The limit and every stage stay in view; the ends of the sweep may leave it. */
function ceiling({ stages, best }: Budget, limit: number): number {
  return 1.6 * Math.max(limit, best?.total ?? 0, ...stages.map(({ total }) => total ?? 0));
}

function curves({ sweep }: Budget): Series[] {
  const over = (values: readonly (number | null)[]) => pointsOf(sweep.noiseBandwidth, values);
  const parts: Series[] = [
    {
      label: patterned(sweep) ? 'noise and pattern' : 'noise',
      tone: 'soft',
      thin: true,
      points: over(detectorJitter(sweep)),
    },
    { label: 'oscillator', tone: 'soft', thin: true, dash: true, points: over(sweep.oscillator) },
    { label: 'total', tone: 'ink', points: over(sweep.total) },
  ];
  const drawn = parts.filter(({ points }) => points.length > 1);
  // With one term alone the total is that term.
  return drawn.length > 2 ? drawn : drawn.slice(-1);
}

/** What the detector passes on: channel noise and the pattern of the data, as one rms. */
const detectorJitter = ({ thermal, selfNoise }: Budget['sweep']): (number | null)[] =>
  thermal.map((value, i) => (value === null ? null : Math.hypot(value, selfNoise[i] ?? 0)));

const patterned = ({ selfNoise }: Budget['sweep']): boolean => selfNoise.some((value) => (value ?? 0) > 0);

const marks = (budget: Budget, asked: readonly (number | null)[]): Marker[] =>
  budget.stages.flatMap(({ stage, total }, index): Marker[] => {
    const x = asked[index];
    if (total === null || x === null || x === undefined) return [];
    return [{ x, y: total, tone: toneOf(index, asked.length), label: `${stage} ${jitterText(total, budget)}` }];
  });

const least = ({ best }: Budget): Marker[] =>
  best ? [{ x: best.noiseBandwidth, y: best.total, tone: 'ink', hollow: true }] : [];

function captionOf(budget: Budget, limit: number): string {
  const last = budget.stages.at(-1);
  const best = budget.best
    ? `The total is least, ${withUnit(budget.best.total, budget)}, at BnT ${numberText(budget.best.noiseBandwidth, { significant: 2 })}`
    : 'Nothing here rises as the bandwidth falls';
  const total = last?.total ?? null;
  if (!last || total === null) return `${best}.`;
  return `${best}; ${last.stage} has ${withUnit(total, budget)} of at most ${withUnit(limit, budget)}.`;
}
