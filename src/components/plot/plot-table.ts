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
  return [curveTable(data), markTable(data)].filter((table) => table.rows.length > 0);
}

function curveTable(data: PlotData): PlotTable {
  const { series, x } = data;
  const xs = [...new Set(series.flatMap(({ points }) => points.map(([at]) => at)))].sort((a, b) => a - b);
  const head = series.flatMap((each) =>
    each.area ? [each.label, `${each.label}, low`, `${each.label}, high`] : [each.label],
  );
  return { head: [axisName(x), ...head], rows: xs.map((at) => [at, ...series.flatMap((each) => valuesAt(each, at))]) };
}

function valuesAt(series: Series, x: number): (number | undefined)[] {
  const exact = series.points.find(([at]) => at === x)?.[1];
  if (!series.area) return [exact];
  const [, low, high] = series.area.find(([at]) => at === x) ?? [];
  return [exact, low, high];
}

function markTable({ markers, x, y }: PlotData): PlotTable {
  const bars = markers.some(({ low, high }) => low !== undefined || high !== undefined);
  return {
    head: [axisName(x), axisName(y), ...(bars ? ['low', 'high'] : [])],
    rows: markers.map((mark) => [mark.x, mark.y, ...(bars ? [mark.low, mark.high] : [])]),
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
