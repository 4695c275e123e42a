import { plainText } from '../../shared/quantities/format';

export type TableFormat = 'tsv' | 'csv';

/** What a table shows as plain ASCII text: minus as `-`, no gaps, one line a row; spanned cells come once. */
export function tableText(table: HTMLTableElement, format: TableFormat = 'tsv'): string {
  return rowsText(
    [...table.rows].map((row) => [...row.cells].map(cellText)),
    format,
  );
}

/** Rows of cells as text, ending in a line break. */
export function rowsText(rows: readonly (readonly string[])[], format: TableFormat): string {
  const cell = format === 'csv' ? csvCell : (text: string) => text.replace(/[\t\n]/g, ' ');
  return rows
    .map((row) => `${row.map((text) => cell(plainText(text))).join(format === 'csv' ? ',' : '\t')}\n`)
    .join('');
}

/** Sups become ^: 996·2^-5 is what a script can read. */
function cellText(cell: HTMLTableCellElement): string {
  const copy = cell.cloneNode(true) as HTMLTableCellElement;
  copy.querySelectorAll('.uin').forEach((hidden) => hidden.remove());
  copy.querySelectorAll('sup').forEach((sup) => sup.replaceWith(`^${sup.textContent}`));
  return (copy.textContent ?? '').replace(/\s+/g, ' ').trim();
}

const csvCell = (text: string): string => (/[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);
