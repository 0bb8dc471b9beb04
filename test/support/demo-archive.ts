import { readdirSync, readFileSync } from 'node:fs';

const FOLDER = new URL('../../datasets/demo-studio/', import.meta.url);

/** The CSV files of the demo studio, by their path below `demo/`, for a fake world. */
export function demoFiles(): Record<string, Uint8Array> {
  const names = readdirSync(FOLDER).filter((name) => name.endsWith('.csv'));
  return Object.fromEntries(
    names.map((name) => [`demo/${name}`, readFileSync(new URL(name, FOLDER))]),
  );
}
