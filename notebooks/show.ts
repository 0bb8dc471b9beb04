/** What the notebooks share: a way to show a table, and the demo studio's files. */
import { readdirSync, readFileSync } from 'node:fs';

/** A value that a Jupyter front end shows as a table; elsewhere its plain text. */
export interface Shown {
  readonly [display: symbol]: () => Readonly<Record<string, string>>;
}

/**
 * A table, as HTML and as plain text.
 *
 * @param head - headings
 * @param rows - cells, as they are to be shown
 * @returns a value for the last line of a cell
 */
export function table(head: readonly string[], rows: readonly (readonly string[])[]): Shown {
  const all = [head, ...rows];
  const widths = head.map((_, j) => Math.max(...all.map((row) => row[j].length)));
  const plain = all.map((row) =>
    row
      .map((cell, j) => cell.padEnd(widths[j]))
      .join('  ')
      .trimEnd(),
  );
  const line = (row: readonly string[], tag: string) =>
    `<tr>${row.map((cell) => `<${tag}>${escaped(cell)}</${tag}>`).join('')}</tr>`;
  const html = `<table>${line(head, 'th')}${rows.map((row) => line(row, 'td')).join('')}</table>`;
  return {
    [Symbol.for('Jupyter.display')]: () => ({ 'text/html': html, 'text/plain': plain.join('\n') }),
  };
}

/**
 * The CSV files of the invented demo studio.
 *
 * @returns bytes by file name, as `parseArchive` takes them
 */
export function demoStudio(): ReadonlyMap<string, Uint8Array> {
  const folder = new URL('../datasets/demo-studio/', import.meta.url);
  const names = readdirSync(folder).filter((name) => name.endsWith('.csv'));
  return new Map(names.map((name) => [name, readFileSync(new URL(name, folder))]));
}

/**
 * A share in percent.
 *
 * @param share - 0 to 1
 * @returns whole percent, such as `47 %`
 */
export function percent(share: number): string {
  return `${Math.round(100 * share)} %`;
}

/**
 * A probability with its interval.
 *
 * @param share - 0 to 1
 * @param interval - both ends
 * @returns such as `47 % (33 to 63)`
 */
export function withInterval(share: number, [low, high]: readonly [number, number]): string {
  return `${percent(share)} (${Math.round(100 * low)} to ${Math.round(100 * high)})`;
}

function escaped(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;');
}
