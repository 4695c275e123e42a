import { traceOf, traceStep } from './curves';
import { toneClass, type Band, type Limit, type Marker, type PlotData, type Series } from './plot-model';
import type { PlotScales } from './scales';

export interface Label {
  text: string;
  x: number;
  y: number;
  anchor: 'start' | 'middle' | 'end';
  tone: string;
}

interface Box {
  x0: number;
  x1: number;
  y0: number;
  y1: number;
}

const sans = 6.1;
const enough = 26;

/**
 * Direct labels of a plot: limits first, because their place is given, then marks, then each curve where it is farthest
 * from everything else, at its end when that is free.
 */
export function placeLabels(data: PlotData, scales: PlotScales): Label[] {
  const traces = data.series.map((series) => traceOf(series.points, scales));
  const placed: Label[] = [];
  const cost = (label: Label, own?: number) =>
    Math.min(
      clearance(boxOf(label), traces, scales, placed, data.markers, own),
      ...data.limits
        .filter(({ label: text }) => text !== label.text)
        .map((limit) => apartFrom(limit, boxOf(label), scales)),
    );
  const put = (candidates: readonly Label[], own?: number, wanted = enough) => {
    const inside = candidates.filter((label) => isInside(boxOf(label), scales));
    const best = inside
      .map((label) => ({ label, free: Math.min(wanted, cost(label, own)) }))
      .sort((a, b) => b.free - a.free)[0];
    if (best) placed.push(best.label);
  };
  data.limits.forEach((limit) => put(limitPlaces(limit, scales), undefined, 4));
  data.bands.forEach((band) => put(bandPlaces(band, scales), undefined, 4));
  data.markers.forEach((marker) => put(markerPlaces(marker, scales), undefined, 4));
  data.series.forEach((series, at) => {
    if (!series.quiet) put(curvePlaces(series, traces[at]!, scales), at);
  });
  return placed;
}

function boxOf({ text, x, y, anchor }: Label): Box {
  const width = sans * text.length;
  const x0 = anchor === 'start' ? x : anchor === 'end' ? x - width : x - width / 2;
  return { x0, x1: x0 + width, y0: y - 10, y1: y + 3 };
}

/** A mark with its error bar. */
function boxOfMark({ x, y, low = y, high = y }: Marker, scales: PlotScales): Box {
  const px = scales.x(x);
  return { x0: px - 4, x1: px + 4, y0: scales.y(Math.max(y, high)) - 4, y1: scales.y(Math.min(y, low)) + 4 };
}

const isInside = (box: Box, { left, right, top, bottom }: PlotScales): boolean =>
  box.x0 >= left && box.x1 <= right + 4 && box.y0 >= top - 6 && box.y1 <= bottom;

/** Pixels between a label and whatever is nearest to it, at most `enough`; its own curve does not count. */
function clearance(
  box: Box,
  traces: readonly (readonly (number | undefined)[])[],
  scales: PlotScales,
  placed: readonly Label[],
  markers: readonly Marker[],
  own?: number,
): number {
  const from = Math.max(0, Math.floor((box.x0 - scales.left) / traceStep));
  const to = Math.ceil((box.x1 - scales.left) / traceStep);
  const heights = traces.flatMap((trace, at) => (at === own ? [] : trace.slice(from, to + 1)));
  const curves = heights.map((y) => (y === undefined ? enough : Math.max(box.y0 - y, y - box.y1)));
  const labels = placed.map((other) => apart(box, boxOf(other)));
  const marks = markers.map((marker) => apart(box, boxOfMark(marker, scales)));
  return Math.min(enough, ...curves, ...labels.map((gap) => 2 * gap), ...marks);
}

/** A label of something else must not stand on a limit line. */
function apartFrom({ at, axis }: Limit, box: Box, { x, y, left, right, top, bottom }: PlotScales): number {
  const upright = axis === 'x';
  const line = upright ? { x0: x(at), x1: x(at), y0: top, y1: bottom } : { x0: left, x1: right, y0: y(at), y1: y(at) };
  return apart(box, line);
}

const apart = (a: Box, b: Box): number =>
  Math.max(Math.max(a.x0 - b.x1, b.x0 - a.x1), Math.max(a.y0 - b.y1, b.y0 - a.y1));

function curvePlaces(series: Series, trace: readonly (number | undefined)[], scales: PlotScales): Label[] {
  const { x, left, right } = scales;
  const width = sans * series.label.length;
  const at = (middle: number) => curvePlacesAt(series, trace, scales, middle, width);
  if (series.labelAt !== undefined)
    return at(Math.min(right - width / 2, Math.max(left + width / 2, x(series.labelAt))));
  const places: Label[] = [];
  // From the right end leftwards: sort() keeps the order of equals, so a free end wins.
  for (let middle = right - width / 2; middle >= left + width / 2; middle -= 8) places.push(...at(middle));
  return places;
}

function curvePlacesAt(
  series: Series,
  trace: readonly (number | undefined)[],
  { left }: PlotScales,
  middle: number,
  width: number,
): Label[] {
  const from = Math.max(0, Math.floor((middle - width / 2 - left) / traceStep));
  const own = trace.slice(from, Math.ceil((middle + width / 2 - left) / traceStep) + 1).filter((y) => y !== undefined);
  if (own.length === 0) return [];
  const [highest, lowest] = [Math.min(...own), Math.max(...own)];
  // A label beside a steep piece would hang far from its curve.
  if (lowest - highest > 40) return [];
  const label = { text: series.label, x: middle, anchor: 'middle' as const, tone: toneClass[series.tone] };
  return [
    { ...label, y: highest - 6 },
    { ...label, y: lowest + 14 },
  ];
}

function limitPlaces(limit: Limit, { x, y, left, right, top, bottom }: PlotScales): Label[] {
  const tone = limit.tone === 'soft' ? 'sof' : 'limt';
  const of = (px: number, py: number, anchor: Label['anchor']): Label => ({
    text: limit.label,
    x: px,
    y: py,
    anchor,
    tone,
  });
  if (limit.axis === 'x') {
    const px = x(limit.at);
    return [bottom - 8, top + 10].flatMap((py) => [of(px + 5, py, 'start'), of(px - 5, py, 'end')]);
  }
  const py = y(limit.at);
  const ends = [of(right - 2, py - 4, 'end'), of(right - 2, py + 12, 'end'), of(left + 4, py - 4, 'start')];
  const between = Array.from({ length: Math.floor((right - left) / 16) }, (_, step) => right - 2 - 16 * step);
  return [...ends, ...between.flatMap((at) => [of(at, py - 4, 'end'), of(at, py + 12, 'end')])];
}

function bandPlaces(band: Band, { x, top, bottom }: PlotScales): Label[] {
  if (!band.label) return [];
  const middle = (x(band.from) + x(band.to)) / 2;
  const heights = [top + 14, top + 28, bottom - 8, (top + bottom) / 2];
  return heights.map((y) => ({ text: band.label!, x: middle, y, anchor: 'middle', tone: 'sof' }));
}

function markerPlaces(marker: Marker, { x, y }: PlotScales): Label[] {
  if (!marker.label) return [];
  const [px, py] = [x(marker.x), y(marker.y)];
  const of = (dx: number, dy: number, anchor: Label['anchor']): Label => ({
    text: marker.label!,
    x: px + dx,
    y: py + dy,
    anchor,
    tone: marker.undecided ? 'caut' : toneClass[marker.tone],
  });
  return [
    of(8, 4, 'start'),
    of(-8, 4, 'end'),
    of(0, -9, 'middle'),
    of(0, 17, 'middle'),
    of(8, 17, 'start'),
    of(-8, 17, 'end'),
  ];
}
