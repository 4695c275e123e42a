import { ticks } from 'd3';
import { numberText } from '../../../shared/quantities/format';
import type { Replay } from '../../api/replays';
import type { Axis, Band, Marker, PlotData, Series, Tone } from '../plot/plot-model';
import { pointsAt, type CheckPoint } from './check-points';
import type { OffsetScale } from './offset-scale';
import { percentText } from './replay-facts';

/** Colours of the Es/N0 values of one figure, in their order. */
const tones: readonly Tone[] = ['track', 'acquire', 'ink'];

/** What a figure shows, under its title. */
export type Figure = PlotData & { title: string };

/** One Es/N0 of a figure. */
interface Level {
  esN0Db: number;
  label: string;
  tone: Tone;
  points: CheckPoint[];
}

export interface FigureInput {
  replay: Replay;
  scale: OffsetScale;
  /** Offset that the plan asks for, ± Hz; 0: none. */
  requiredHz: number;
}

/** Three series are the most that one figure carries; more Es/N0 values make more figures. */
export function levelGroups({ check }: Replay): number[][] {
  const groups: number[][] = [];
  for (let at = 0; at < check.esN0Db.length; at += tones.length) groups.push(check.esN0Db.slice(at, at + tones.length));
  return groups;
}

const levelsOf = (replay: Replay, group: readonly number[]): Level[] =>
  group.map((esN0Db, place) => ({
    esN0Db,
    label: `${numberText(esN0Db)} dB`,
    tone: tones[place] ?? 'ink',
    points: pointsAt(replay.check, esN0Db, replay.points),
  }));

/** Lock share over offset with its intervals. Points that have not run lie hollow on the axis. */
export function shareFigure(input: FigureInput, group: readonly number[]): Figure {
  const { replay, scale } = input;
  const { check } = replay;
  const levels = levelsOf(replay, group);
  return {
    title: `Locked, share of ${numberText(check.trials)} trials, ${percentText(check.limits.confidence)} interval`,
    x: offsetAxis(input),
    y: { label: 'share', domain: [0, 1], ticks: [0, 0.25, 0.5, 0.75, 1], zero: true },
    series: levels.map((level) => ({
      label: level.label,
      tone: level.tone,
      thin: true,
      points: done(level).map((point) => [scale.of(point.offsetHz), point.result.lockProbability.estimate] as const),
      quiet: levels.length === 1,
    })),
    bands: requiredBand(input),
    limits: [{ at: check.limits.lockProbability, label: `limit ${numberText(check.limits.lockProbability)}` }],
    markers: levels.flatMap((level) => [...shareMarkers(level, scale, 0), ...waitingMarkers(level, scale)]),
  };
}

/** The same close to 1, where the limit lies. Intervals that leave the figure are cut at its edge. */
export function nearOneFigure(input: FigureInput, group: readonly number[]): Figure {
  const { replay, scale } = input;
  const limit = replay.check.limits.lockProbability;
  const least = Math.max(0, 1 - 6 * Math.max(1 - limit, 0.001));
  return {
    title: 'Same, near 1',
    x: offsetAxis(input, 4),
    y: { label: 'share', domain: [least, 1] },
    series: [],
    bands: requiredBand(input, true),
    limits: [{ at: limit, label: `limit ${numberText(limit)}` }],
    markers: levelsOf(replay, group)
      .map((level) => ({
        ...level,
        points: level.points.filter(({ result }) => result && result.lockProbability.upper > least),
      }))
      .flatMap((level) => shareMarkers(level, scale, least)),
  };
}

/** Median lock time with the band up to the 95th percentile. */
export function timeFigure(input: FigureInput, group: readonly number[], switchSymbols: number | undefined): Figure {
  const { replay, scale } = input;
  const timed = levelsOf(replay, group).map((level) => ({ ...level, times: done(level).flatMap(timeOf(scale)) }));
  const longest = Math.max(0, ...timed.flatMap(({ times }) => times.map(([, , most]) => most)));
  return {
    title: 'Lock time, symbols, median and 95 %',
    x: offsetAxis(input, 4),
    y: { label: 'symbols', unit: 'symbols', zero: true },
    series: timed.map((level) => ({
      label: timed.length === 1 ? 'median' : level.label,
      tone: level.tone,
      points: level.times.map(([x, median]) => [x, median] as const),
      area: level.times,
    })),
    bands: requiredBand(input, true),
    markers: [],
    limits:
      switchSymbols !== undefined && switchSymbols <= 2 * longest
        ? [{ at: switchSymbols, label: `stage switch ${numberText(switchSymbols)}`, tone: 'soft' }]
        : [],
  };
}

/** Phase jitter after lock beside the thermal budget, where the plan's own Es/N0 is among those replayed. */
export function jitterFigure(input: FigureInput, group: readonly number[], budgetDeg: number | undefined): Figure {
  const { replay, scale } = input;
  const x = offsetAxis(input, 4);
  return {
    title: 'Phase jitter, ° rms',
    x,
    y: { label: 'jitter', unit: '° rms', zero: true },
    series: budgetDeg === undefined ? [] : [levelLine('thermal budget', budgetDeg, x)],
    bands: requiredBand(input, true),
    limits: [],
    markers: levelsOf(replay, group).flatMap((level) =>
      done(level).flatMap(({ offsetHz, result }) =>
        result.phaseJitterDeg === null
          ? []
          : [{ x: scale.of(offsetHz), y: result.phaseJitterDeg, tone: level.tone, hollow: true }],
      ),
    ),
  };
}

/** Unlabelled, because the points it is compared with lie along it: the caption names it. */
const levelLine = (label: string, value: number, { domain = [0, 0] }: Axis): Series => ({
  label,
  tone: 'soft',
  dash: true,
  quiet: true,
  points: domain.map((x) => [x, value] as const),
});

type DonePoint = CheckPoint & { result: NonNullable<CheckPoint['result']> };

const done = (level: Level): DonePoint[] =>
  level.points.filter((point): point is DonePoint => point.result !== undefined);

const timeOf =
  (scale: OffsetScale) =>
  ({ offsetHz, result }: DonePoint): [x: number, median: number, most: number][] =>
    result.lockTimeSymbols ? [[scale.of(offsetHz), result.lockTimeSymbols.p50, result.lockTimeSymbols.p95]] : [];

const shareMarkers = (level: Level, scale: OffsetScale, least: number): Marker[] =>
  done(level).map(({ offsetHz, result: { lockProbability, verdict } }) => ({
    x: scale.of(offsetHz),
    y: Math.max(least, lockProbability.estimate),
    low: Math.max(least, lockProbability.lower),
    high: lockProbability.upper,
    tone: level.tone,
    hollow: verdict === 'undecided',
    undecided: verdict === 'undecided',
  }));

function waitingMarkers(level: Level, scale: OffsetScale): Marker[] {
  const waiting = level.points.filter(({ result }) => !result);
  return waiting.map(({ offsetHz }, place) => ({
    x: scale.of(offsetHz),
    y: 0,
    tone: level.tone,
    hollow: true,
    ...(place === waiting.length - 1 && { label: `${level.label} not run` }),
  }));
}

function offsetAxis({ replay, scale, requiredHz }: FigureInput, wanted = 6): Axis {
  const { start, stop } = replay.check.carrierOffsetHz;
  const [low, high] = [scale.of(Math.min(start, stop)), scale.of(Math.max(start, stop))];
  return {
    label: 'carrier offset',
    unit: scale.unit,
    domain: low === high ? [low - 1, high + 1] : [low, high],
    ticks: offsetTicks(low, high, scale.of(requiredHz), wanted),
  };
}

/** Round numbers and, in their place, the ends of the range that the plan asks for. */
export function offsetTicks(low: number, high: number, required: number, wanted: number): number[] {
  const own = required > 0 ? [-required, required].filter((at) => at >= low && at <= high) : [];
  const apart = (high - low) / (1.6 * wanted);
  const round = ticks(low, high, wanted).filter((at) => own.every((each) => Math.abs(each - at) > apart));
  return [...round, ...own].sort((a, b) => a - b);
}

function requiredBand({ replay, scale, requiredHz }: FigureInput, quiet = false): Band[] {
  if (requiredHz === 0) return [];
  const { start, stop } = replay.check.carrierOffsetHz;
  const from = Math.max(-requiredHz, Math.min(start, stop));
  const to = Math.min(requiredHz, Math.max(start, stop));
  if (from >= to) return [];
  const label = `required ±${numberText(scale.of(requiredHz))}`;
  return [{ from: scale.of(from), to: scale.of(to), ...(quiet ? {} : { label }) }];
}
