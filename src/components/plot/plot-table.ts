import { numberText } from '../../../shared/quantities/format';
import { heightAt } from './curves';
import { axisName, type PlotData, type Series } from './plot-model';

export interface PlotTable {
  head: readonly string[];
  rows: readonly (readonly (number | undefined)[])[];
}

/** Every abscissa at which a curve or a mark has a value, ascending. */
export function abscissas({ series, markers }: PlotData): number[] {
  const all = [...series.flatMap(({ points }) => points.map(([x]) => x)), ...markers.map(({ x }) => x)];
  return [...new Set(all)].sort((a, b) => a - b);
}

/** The data of a plot as tables: curves side by side over x, then the marks with their intervals. */
export function plotTables(data: PlotData): PlotTable[] {
  return [curveTable(data), markTable(data), pathTable(data)].filter((table) => table.rows.length > 0);
}

function curveTable({ series, x }: PlotData): PlotTable {
  const xs = [...new Set(series.flatMap(({ points }) => points.map(([at]) => at)))].sort((a, b) => a - b);
  const columns = series.flatMap(columnsOf);
  return {
    head: [axisName(x), ...columns.map(({ head }) => head)],
    rows: xs.map((at) => [at, ...columns.map(({ values }) => values.get(at))]),
  };
}

function columnsOf({ label, points, area }: Series): { head: string; values: Map<number, number> }[] {
  const curve = { head: label, values: new Map(points) };
  if (!area) return [curve];
  return [
    curve,
    { head: `${label}, low`, values: new Map(area.map(([at, low]) => [at, low])) },
    { head: `${label}, high`, values: new Map(area.map(([at, , high]) => [at, high])) },
  ];
}

function markTable({ markers, x, y }: PlotData): PlotTable {
  const bars = markers.some(({ low, high }) => low !== undefined || high !== undefined);
  return {
    head: [axisName(x), axisName(y), ...(bars ? ['low', 'high'] : [])],
    rows: markers.map((mark) => [mark.x, mark.y, ...(bars ? [mark.low, mark.high] : [])]),
  };
}

/** Every line point by point, what changes along it first. */
function pathTable({ x, y, paths = [], pathsOver = '' }: PlotData): PlotTable {
  return {
    head: ['line', pathsOver, axisName(x), axisName(y)],
    rows: paths.flatMap(({ points, along }, line) => points.map(([px, py], at) => [line + 1, along[at], px, py])),
  };
}

/** Values under the crosshair, curve by curve; marks only where one stands. */
export function readingsAt(
  data: PlotData,
  x: number,
  across: (value: number) => number,
): { label: string; tone: Series['tone']; value: number }[] {
  const curves = data.series.map(({ label, tone, points }) => ({ label, tone, value: heightAt(points, x, across) }));
  const marks = data.markers
    .filter((mark) => mark.x === x)
    .map(({ label, tone, y }) => ({ label: label ?? '', tone, value: y }));
  return [...curves, ...marks].flatMap(({ value, ...rest }) => (value === undefined ? [] : [{ ...rest, value }]));
}

export const readingText = (value: number): string =>
  numberText(Number(value.toPrecision(5)), Math.abs(value) > 0 && Math.abs(value) < 1e-4 ? { exponent: true } : {});
