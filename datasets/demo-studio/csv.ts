/** What a cell may hold. */
export type Cell = string | number;

/**
 * Rows as CSV text: comma, line feed, one header line.
 *
 * @param header - names of the columns
 * @param rows - one cell for each column
 * @returns the file's text, ending with a line feed
 */
export function csv(header: readonly string[], rows: readonly (readonly Cell[])[]): string {
  return [header, ...rows].map((row) => `${row.map(written).join(',')}\n`).join('');
}

function written(cell: Cell): string {
  const text = String(cell);
  return /[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
