import type { LoopDesign, StageDesign } from '../../../shared/model/design';
import { commonUnit, moveDecimals } from '../../../shared/quantities/format';

/** A number in a cell and how many digits it earns. */
export interface GainCell {
  value: number | null;
  decimals?: number;
  significant?: number;
  exponent?: boolean;
  sign?: boolean;
}

export interface GainWordCell {
  mantissa: number;
  shift: number;
}

export interface GainRow {
  label: string;
  unit: string;
  /** One cell for each stage; null where a number belongs to the loop as a whole and stands under the last stage. */
  cells: (GainCell | GainWordCell | null)[];
}

export interface GainGroup {
  title: string;
  rows: GainRow[];
}

/** Everything that a design says of a loop's stages: asked for, reached, gains, words. */
export function gainGroups(loop: LoopDesign): GainGroup[] {
  const { stages } = loop;
  return [
    { title: 'Asked for', rows: askedRows(stages) },
    { title: 'What the loop does, delay included', rows: reachedRows(stages) },
    { title: 'Gains of the loop', rows: loopGainRows(stages) },
    { title: 'Gains, per detector unit', rows: detectorGainRows(stages, loop.detector.gain) },
    { title: 'Words', rows: wordRows(stages) },
    { title: 'Detector and range', rows: rangeRows(loop) },
  ];
}

type Read = (stage: StageDesign) => number | null | undefined;

const row = (label: string, unit: string, style: Omit<GainCell, 'value'>, read: Read) => ({
  of: (stages: readonly StageDesign[]): GainRow => ({
    label,
    unit,
    cells: stages.map((stage) => ({ value: read(stage) ?? null, ...style })),
  }),
});

/** A row of frequencies, all in the prefix that suits the largest. */
const frequencies = (label: string, digits: number, read: Read) => ({
  of: (stages: readonly StageDesign[]): GainRow => {
    const values = stages.map((stage) => read(stage) ?? 0);
    const { unit, exponent } = commonUnit(values, 'Hz');
    return row(label, unit, { decimals: digits }, (stage) => moved(read(stage), -exponent)).of(stages);
  },
});

const moved = (value: number | null | undefined, exponent: number): number | null =>
  value === null || value === undefined ? null : moveDecimals(value, exponent);

const percent = (value: number | null): number | null => (value === null ? null : 100 * value);
const decibels = (ratio: number | null): number | null => (ratio === null ? null : 20 * Math.log10(ratio));

/** Rows that no stage has a value for are left out: ζ of a third-order loop. */
const present = (rows: GainRow[]): GainRow[] =>
  rows.filter(({ cells }) => cells.some((cell) => cell && ('mantissa' in cell || cell.value !== null)));

function askedRows(stages: readonly StageDesign[]): GainRow[] {
  return present([
    row('Noise bandwidth BnT', '', { decimals: 4 }, (stage) => stage.noiseBandwidth.wanted).of(stages),
    row('Damping ζ', '', { decimals: 4 }, (stage) => stage.damping.wanted).of(stages),
  ]);
}

function reachedRows(stages: readonly StageDesign[]): GainRow[] {
  return [
    row('Noise bandwidth BnT', '', { decimals: 6 }, (stage) => stage.noiseBandwidth.exact).of(stages),
    frequencies('Noise bandwidth Bn', 2, (stage) => stage.noiseBandwidthHz.exact).of(stages),
    ...present([row('Damping ζ', '', { decimals: 6 }, (stage) => stage.damping.exact).of(stages)]),
    ...present([frequencies('Natural frequency', 3, (stage) => stage.naturalFrequencyHz.exact).of(stages)]),
    row('Phase margin', '°', { decimals: 1 }, (stage) => stage.margins.phaseDeg).of(stages),
    row('Gain margin', 'dB', { decimals: 1 }, (stage) => decibels(stage.margins.gainUp)).of(stages),
    row('Peaking of H', 'dB', { decimals: 2 }, (stage) => stage.peakingDb).of(stages),
    row('Settles to 2 %', 'updates', { decimals: 0 }, (stage) => stage.settlingUpdates).of(stages),
    row('Stable up to delay', 'updates', { decimals: 0 }, (stage) => stage.largestDelay).of(stages),
  ];
}

const scientific = { significant: 5, exponent: true };

type GainName = 'g1' | 'g2' | 'g3';

/** An integral gain that a first-order loop lacks is none, not 0. */
const gainOf = ({ gains }: StageDesign, name: GainName): number | null => gains[name] || null;

function loopGainRows(stages: readonly StageDesign[]): GainRow[] {
  return present([
    row('Proportional g1', '', scientific, (stage) => gainOf(stage, 'g1')).of(stages),
    row('Integral g2', '', scientific, (stage) => gainOf(stage, 'g2')).of(stages),
    row('Second integral g3', '', scientific, (stage) => gainOf(stage, 'g3')).of(stages),
  ]);
}

/** What one detector unit turns the oscillator by: the loop's gains over the slope of the detector. */
function detectorGainRows(stages: readonly StageDesign[], slope: number): GainRow[] {
  const over = (name: GainName) => (stage: StageDesign) => {
    const gain = gainOf(stage, name);
    return gain === null ? null : gain / slope;
  };
  return present([
    row('Proportional', '', scientific, over('g1')).of(stages),
    row('Integral', '', scientific, over('g2')).of(stages),
    row('Second integral', '', scientific, over('g3')).of(stages),
  ]);
}

function wordRows(stages: readonly StageDesign[]): GainRow[] {
  return [
    ...words('Proportional', 'proportional', stages),
    ...words('Integral', 'integral', stages),
    ...words('Second integral', 'integral2', stages),
    row('BnT from words', '', { decimals: 6 }, (stage) => stage.noiseBandwidth.effective).of(stages),
    row('Error of BnT', '%', { decimals: 3, sign: true }, (stage) => percent(stage.bandwidthError)).of(stages),
    ...present([row('ζ from words', '', { decimals: 6 }, (stage) => stage.damping.effective).of(stages)]),
  ];
}

function words(
  label: string,
  name: 'proportional' | 'integral' | 'integral2',
  stages: readonly StageDesign[],
): GainRow[] {
  const cells = stages.map((stage) => stage.words[name]).filter((word) => word !== undefined);
  return cells.length === stages.length ? [{ label, unit: '', cells }] : [];
}

type Whole = Omit<GainCell, 'value'> & { value: number | null };

/** What belongs to the loop and to no single stage: the slope at lock, and how far off it may start. */
function rangeRows({ detector, stages, acquisition, resolutionHz }: LoopDesign): GainRow[] {
  const { unambiguousHz, falseLockSpacingHz, offsetHz, largestOffsetHz, lockInHz, pullInSymbols, pullInRangeHz } =
    acquisition;
  const { offsetPpm, largestOffsetPpm } = acquisition;
  const put = (label: string, unit: string, cell: Whole): GainRow => ({
    ...{ label, unit },
    cells: stages.map((_, index) => (index === stages.length - 1 ? cell : null)),
  });
  const hertz = (label: string, value: number | null): GainRow => {
    const { value: shown, unit } = inPrefix(value);
    return put(label, unit, { value: shown, decimals: 2 });
  };
  return present([
    put('Slope at lock Kd', '', { value: detector.gain, decimals: 4 }),
    hertz('One LSB', resolutionHz),
    hertz('Unambiguous below', unambiguousHz),
    hertz('False locks every', falseLockSpacingHz),
    hertz('Offset to expect', offsetHz || null),
    hertz('Offset held', largestOffsetHz),
    put('Rate error to expect', 'ppm', { value: offsetPpm || null, decimals: 1 }),
    put('Rate error held', 'ppm', { value: largestOffsetPpm, decimals: 1 }),
    hertz('Lock-in, estimate', lockInHz),
    hertz('Pull-in range, estimate', pullInRangeHz),
    put('Pull-in, estimate', 'symbols', { value: pullInSymbols || null, decimals: 0 }),
  ]);
}

function inPrefix(value: number | null): { value: number | null; unit: string } {
  const { unit, exponent } = commonUnit([value ?? 0], 'Hz');
  return { value: moved(value, -exponent), unit };
}

/** Characters that a cell sets behind its point, the point and the exponent included: what aligns a column. */
export function widthBehindPoint(cell: GainCell | GainWordCell | null): number {
  if (!cell) return 0;
  if ('mantissa' in cell) return 3;
  if (cell.exponent) return (cell.significant ?? 1) + 3;
  return cell.decimals ? cell.decimals + 1 : 0;
}
