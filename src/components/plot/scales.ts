import { scaleLinear, scaleLog, type ScaleContinuousNumeric } from 'd3';
import { numberText } from '../../../shared/quantities/format';
import type { Axis, PlotData } from './plot-model';

export type Scale = ScaleContinuousNumeric<number, number>;

export interface PlotScales {
  x: Scale;
  y: Scale;
  xTicks: readonly number[];
  yTicks: readonly number[];
  left: number;
  right: number;
  top: number;
  bottom: number;
}

const mono = 6.4;

/** Scales for a drawing of this many CSS pixels: the tick texts decide where the left edge of the plot lies. */
export function plotScales(data: PlotData, width: number, height: number): PlotScales {
  const [top, bottom, right] = [20, height - 30, width - 8];
  const y = scaleOf(data.y, yValues(data), [bottom, top]);
  const yTicks = ticksOf(data.y, y, Math.max(3, Math.round((bottom - top) / 36)));
  const longest = Math.max(...yTicks.map((tick) => tickText(data.y, tick).length), 0);
  const left = Math.max(38, Math.ceil(mono * longest) + 8);
  const x = scaleOf(data.x, xValues(data), [left, right]);
  return { x, y, xTicks: xTicksOf(data.x, x, right - left), yTicks, left, right, top, bottom };
}

function scaleOf(axis: Axis, values: readonly number[], range: [number, number]): Scale {
  const scale = axis.scale === 'log' ? scaleLog() : scaleLinear();
  const domain = axis.domain ?? domainOf(axis, values);
  scale
    .domain([...domain])
    .range(range)
    .clamp(false);
  return axis.domain || axis.scale === 'log' || range[0] < range[1] ? scale : scale.nice(5);
}

function domainOf(axis: Axis, values: readonly number[]): readonly [number, number] {
  const finite = values.filter((value) => Number.isFinite(value) && (axis.scale !== 'log' || value > 0));
  if (finite.length === 0) return axis.scale === 'log' ? [1, 10] : [0, 1];
  let [low, high] = finite.reduce(([a, b], value) => [Math.min(a, value), Math.max(b, value)], [Infinity, -Infinity]);
  if (axis.zero) [low, high] = [Math.min(0, low), Math.max(0, high)];
  if (axis.symmetric) [low, high] = [-Math.max(-low, high), Math.max(-low, high)];
  if (low < high) return [low, high];
  return axis.scale === 'log' ? [low / 2, high * 2] : [low - 1, high + 1];
}

const xValues = ({ series, markers, bands, limits }: PlotData): number[] => [
  ...series.flatMap(({ points, area }) => [...points.map(([x]) => x), ...(area ?? []).map(([x]) => x)]),
  ...markers.map(({ x }) => x),
  ...bands.flatMap(({ from, to }) => [from, to]),
  ...limits.filter(({ axis }) => axis === 'x').map(({ at }) => at),
];

const yValues = ({ series, markers, limits }: PlotData): number[] => [
  ...series.flatMap(({ points, area }) => [...points.map(([, y]) => y), ...(area ?? []).flatMap(([, a, b]) => [a, b])]),
  ...markers.flatMap(({ y, low, high }) => [y, low ?? y, high ?? y]),
  ...limits.filter(({ axis }) => axis !== 'x').map(({ at }) => at),
];

function ticksOf(axis: Axis, scale: Scale, count: number): readonly number[] {
  const [low = 0, high = 0] = scale.domain();
  if (axis.ticks) return axis.ticks.filter((tick) => tick >= low && tick <= high);
  return axis.scale === 'log' ? logTicks(low, high, count) : scale.ticks(count);
}

/** Fewer ticks until none of their texts comes near the next. */
function xTicksOf(axis: Axis, scale: Scale, width: number): readonly number[] {
  for (let count = Math.min(10, Math.max(2, Math.round(width / 60))); count > 1; count -= 1) {
    const ticks = ticksOf(axis, scale, count);
    if (fits(axis, scale, ticks)) return ticks;
    if (axis.ticks) return thinned(axis, scale, ticks);
  }
  return ticksOf(axis, scale, 1);
}

const fits = (axis: Axis, scale: Scale, ticks: readonly number[]): boolean =>
  ticks.every((tick, at) => {
    const next = ticks[at + 1];
    if (next === undefined) return true;
    const chars = (tickText(axis, tick).length + tickText(axis, next).length) / 2;
    return scale(next) - scale(tick) >= mono * chars + 10;
  });

function thinned(axis: Axis, scale: Scale, ticks: readonly number[]): readonly number[] {
  for (let step = 2; step < ticks.length; step += 1) {
    const kept = ticks.filter((_, at) => at % step === 0);
    if (fits(axis, scale, kept)) return kept;
  }
  return ticks.slice(0, 1);
}

/** Decades, with 3 between them (or 2 and 5) where there is room. */
function logTicks(low: number, high: number, count: number): number[] {
  const decades = Math.log10(high / low);
  const steps = decades <= 1.2 ? [1, 2, 5] : decades * 2 <= count + 1 ? [1, 3] : [1];
  const every = steps.length === 1 ? Math.max(1, Math.round(decades / count)) : 1;
  const ticks: number[] = [];
  for (let power = Math.floor(Math.log10(low)); power <= Math.ceil(Math.log10(high)); power += every) {
    ticks.push(...steps.map((step) => Number(`${step}e${power}`)));
  }
  return ticks.filter((tick) => tick >= low * (1 - 1e-9) && tick <= high * (1 + 1e-9));
}

const prefixed = ['Hz', 'Bd', 'Hz/s'];

/** Text of a tick: round numbers, with k, M and G on an axis of Hz. */
export function tickText(axis: Axis, value: number): string {
  if (axis.format) return axis.format(value);
  if (axis.unit !== undefined && prefixed.includes(axis.unit) && Math.abs(value) >= 1000) return prefixedText(value);
  const magnitude = Math.abs(value);
  return magnitude > 0 && magnitude < 1e-4
    ? numberText(Number(value.toPrecision(12)), { exponent: true })
    : numberText(Number(value.toPrecision(12)));
}

const siSteps = [
  { from: 1e9, letter: 'G' },
  { from: 1e6, letter: 'M' },
  { from: 0, letter: 'k', by: 1e3 },
];

function prefixedText(value: number): string {
  const { from, letter, by = from } = siSteps.find((step) => Math.abs(value) >= step.from)!;
  return `${numberText(Number((value / by).toPrecision(12)))}\u202f${letter}`;
}
