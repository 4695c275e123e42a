import type { StageDesign } from '../../../shared/model/design';
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

type Read = (stage: StageDesign) => number | null | undefined;

export const row = (label: string, unit: string, style: Omit<GainCell, 'value'>, read: Read) => ({
  of: (stages: readonly StageDesign[]): GainRow => ({
    label,
    unit,
    cells: stages.map((stage) => ({ value: read(stage) ?? null, ...style })),
  }),
});

/** A row of frequencies, all in the prefix that suits the largest. */
export const frequencies = (label: string, digits: number, read: Read) => ({
  of: (stages: readonly StageDesign[]): GainRow => {
    const values = stages.map((stage) => read(stage) ?? 0);
    const { unit, exponent } = commonUnit(values, 'Hz');
    return row(label, unit, { decimals: digits }, (stage) => moved(read(stage), -exponent)).of(stages);
  },
});

const moved = (value: number | null | undefined, exponent: number): number | null =>
  value === null || value === undefined ? null : moveDecimals(value, exponent);

/** Rows that no stage has a value for are left out: ζ of a third-order loop. */
export const present = (rows: GainRow[]): GainRow[] =>
  rows.filter(({ cells }) => cells.some((cell) => cell && ('mantissa' in cell || cell.value !== null)));

/** A row of the loop as a whole: its value stands in the last of so many columns. */
export const whole = (columns: number, label: string, unit: string, cell: GainCell): GainRow => ({
  label,
  unit,
  cells: Array.from({ length: columns }, (_, index) => (index === columns - 1 ? cell : null)),
});

/** The same of a frequency, in the prefix that suits it. */
export function wholeHertz(columns: number, label: string, value: number | null, per = ''): GainRow {
  const { unit, exponent } = commonUnit([value ?? 0], 'Hz');
  return whole(columns, label, `${unit}${per}`, { value: moved(value, -exponent), decimals: 2 });
}

/** Characters that a cell sets behind its point, the point and the exponent included: what aligns a column. */
export function widthBehindPoint(cell: GainCell | GainWordCell | null): number {
  if (!cell) return 0;
  if ('mantissa' in cell) return 3;
  if (cell.exponent) return (cell.significant ?? 1) + 3;
  return cell.decimals ? cell.decimals + 1 : 0;
}
