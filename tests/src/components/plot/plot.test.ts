import { describe, expect, it } from 'vitest';
import { placeLabels } from '../../../../src/components/plot/labels';
import type { Axis, PlotData, Series } from '../../../../src/components/plot/plot-model';
import { plotTables } from '../../../../src/components/plot/plot-table';
import { plotScales, tickText } from '../../../../src/components/plot/scales';

const samples = Array.from({ length: 101 }, (_, at) => at / 100);
const curve = (label: string, of: (x: number) => number): Series => ({
  label,
  tone: 'ink',
  points: samples.map((x) => [x, of(x)] as const),
});
const plot = (part: Partial<PlotData> & { x?: Axis; y?: Axis }): PlotData => ({
  x: { label: 'x' },
  y: { label: 'y' },
  series: [],
  bands: [],
  limits: [],
  markers: [],
  ...part,
});

describe('plotScales', () => {
  it('puts zero into an axis that must have it', () => {
    const series = [curve('margin', (x) => 40 + 20 * x)];
    expect(plotScales(plot({ series, y: { label: 'y', zero: true } }), 300, 196).y.domain()[0]).toBe(0);
    expect(plotScales(plot({ series }), 300, 196).y.domain()[0]).toBe(40);
  });

  it('goes as far below zero as above on a symmetric axis', () => {
    const series = [curve('error', (x) => x - 0.25)];
    const [low, high] = plotScales(plot({ series, y: { label: 'y', symmetric: true } }), 300, 196).y.domain();
    expect(low).toBe(-high!);
  });

  it('keeps a given domain and given ticks to the letter', () => {
    const x: Axis = { label: 'offset', unit: 'kHz', domain: [-155, 155], ticks: [-77.5, 0, 77.5] };
    const scales = plotScales(plot({ x }), 1376, 300);
    expect([scales.x.domain(), scales.xTicks]).toEqual([
      [-155, 155],
      [-77.5, 0, 77.5],
    ]);
  });

  it.each([160, 300, 700, 1376])('sets no tick text against the next at %d px', (width) => {
    const x: Axis = { label: 'symbols', domain: [0, 20_000] };
    const { xTicks, x: scale } = plotScales(plot({ x }), width, 196);
    const ends = xTicks.map((tick) => [scale(tick), (tickText(x, tick).length * 6.4) / 2] as const);
    ends.slice(1).forEach(([at, half], before) => {
      const [left, leftHalf] = ends[before]!;
      expect(at - half - (left + leftHalf)).toBeGreaterThan(4);
    });
  });

  it('marks a log axis by decades and their thirds', () => {
    const x: Axis = { label: 'BnT', scale: 'log', domain: [3e-4, 0.03] };
    expect(plotScales(plot({ x }), 390, 196).xTicks).toEqual([3e-4, 1e-3, 3e-3, 0.01, 0.03]);
  });

  it.each<[Axis, number, string]>([
    [{ label: 'f', unit: 'Hz' }, 1e6, '1\u202fM'],
    [{ label: 'f', unit: 'Hz' }, 10_000, '10\u202fk'],
    [{ label: 'f', unit: 'Hz' }, 100, '100'],
    [{ label: 'n' }, 10_000, '10\u202f000'],
    [{ label: 'n' }, 0.1 + 0.2, '0.3'],
    [{ label: 'n' }, 1e-6, '1e\u22126'],
  ])('writes the tick of %o at %d', (axis, value, text) => {
    expect(tickText(axis, value)).toBe(text);
  });
});

describe('placeLabels', () => {
  // Geometry on its own here: a label of 11 px text is 6.1 px a letter wide and 13 px high.
  const crossed = (data: PlotData, width: number) => {
    const scales = plotScales(data, width, 196);
    return placeLabels(data, scales).filter((label) => {
      const half = (6.1 * label.text.length) / 2;
      const middle = label.x + (label.anchor === 'start' ? half : label.anchor === 'end' ? -half : 0);
      return data.series.some(({ points, label: name }) =>
        points.some(([x, y]) => {
          const [px, py] = [scales.x(x), scales.y(y)];
          return name !== label.text && Math.abs(px - middle) < half && py > label.y - 10 && py < label.y + 2;
        }),
      );
    });
  };

  it.each([300, 360, 700])('lets no label cross a curve of another at %d px', (width) => {
    const series = [
      curve('oscillator', (x) => 5 * Math.exp(-4 * x) + 0.6),
      curve('thermal', (x) => 0.5 + 3 * x * x),
      curve('total', (x) => Math.hypot(5 * Math.exp(-4 * x) + 0.6, 0.5 + 3 * x * x)),
    ];
    const data = plot({ series, limits: [{ at: 3, label: 'limit 3.0' }], y: { label: 'y', zero: true } });
    expect(placeLabels(data, plotScales(data, width, 196))).toHaveLength(4);
    expect(crossed(data, width)).toEqual([]);
  });

  it('keeps the label of a limit from standing on a mark', () => {
    const data = plot({ series: [curve('a', (x) => x)], limits: [{ at: 0.5, label: 'limit' }] });
    const free = placeLabels(data, plotScales(data, 300, 196))[0]!;
    const scales = plotScales(data, 300, 196);
    const marked = { ...data, markers: [{ x: 0.95, y: scales.y.invert(free.y - 4), tone: 'track' as const }] };
    const moved = placeLabels(marked, scales)[0]!;
    expect([moved.x, moved.y]).not.toEqual([free.x, free.y]);
  });

  it('keeps the label of a limit off error bars', () => {
    const marks = [0, 0.25, 0.5, 0.75, 1].map((x) => ({ x, y: 1, low: 0.86, high: 1, tone: 'track' as const }));
    const data = plot({ markers: marks, limits: [{ at: 0.9, label: 'limit 0.9' }], y: { label: 'y', domain: [0, 1] } });
    const scales = plotScales(data, 900, 196);
    const label = placeLabels(data, scales)[0]!;
    const [left, right] = [label.x - 6.1 * label.text.length, label.x];
    expect(marks.filter(({ x }) => scales.x(x) > left - 4 && scales.x(x) < right + 4)).toEqual([]);
  });

  it('says nothing for a quiet curve', () => {
    const data = plot({ series: [{ ...curve('a', (x) => x), quiet: true }] });
    expect(placeLabels(data, plotScales(data, 300, 196))).toEqual([]);
  });
});

describe('plotTables', () => {
  it('lays curves side by side over every abscissa and leaves gaps empty', () => {
    const series: Series[] = [
      { label: 'acquire', tone: 'acquire', points: [[0, 1], [2, 3]] }, // prettier-ignore
      { label: 'track', tone: 'track', points: [[0, 5], [1, 6]], area: [[0, 4, 7]] }, // prettier-ignore
    ];
    expect(plotTables(plot({ series, x: { label: 'delay', unit: 'updates' } }))).toEqual([
      {
        head: ['delay, updates', 'acquire', 'track', 'track, low', 'track, high'],
        rows: [
          [0, 1, 5, 4, 7],
          [1, undefined, 6, undefined, undefined],
          [2, 3, undefined, undefined, undefined],
        ],
      },
    ]);
  });

  it('gives marks a table of their own with their intervals', () => {
    const markers = [{ x: 77.5, y: 0.9975, low: 0.9862, high: 0.9999, tone: 'track' as const }];
    const [table] = plotTables(plot({ markers, y: { label: 'locked' } }));
    expect(table).toEqual({ head: ['x', 'locked', 'low', 'high'], rows: [[77.5, 0.9975, 0.9862, 0.9999]] });
  });
});
