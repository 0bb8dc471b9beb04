import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';

type Row = Readonly<Record<string, string>>;

/** The rows of one table of `datasets/published/`, every cell as written. */
export function publishedTable(file: string): readonly Row[] {
  const url = new URL(`../../datasets/published/${file}`, import.meta.url);
  return parse<Row>(readFileSync(url, 'utf8'), { columns: true });
}

/** Items of one worked example of umf-examples.csv that play one role, with their values. */
export function exampleItems(
  example: string,
  role: string,
): readonly (readonly [string, number])[] {
  const rows = publishedTable('umf-examples.csv');
  const found = rows.filter((row) => row['example'] === example && row['role'] === role);
  if (found.length === 0) throw new Error(`no rows for ${example} ${role}`);
  return found.map((row) => [row['item'], Number(row['value'])] as const);
}
