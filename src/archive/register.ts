import type { Fault } from '../errors.ts';
import { quoted } from './found-text.ts';
import { byName } from './name-order.ts';
import { nameAdvice, type NameAdvice } from './nearest-name.ts';
import { repeatedNames } from './repeated-names.ts';

/** What one file of the archive defines by name, for the rows of other files that refer to it. */
export interface Register<Value> {
  /** The file as the user knows it. */
  readonly file: string;
  /** One thing of it, for messages: `firing`. */
  readonly noun: string;
  readonly sound: ReadonlyMap<string, Value>;
  /** Names whose rows are faulty, with the line to look at. */
  readonly faulty: ReadonlyMap<string, number>;
  /** The file has a faulty heading: what it does not define is not known either. */
  readonly unreadable: boolean;
  readonly advice: NameAdvice;
}

/**
 * A register from the rows of a file.
 *
 * @param file - the file as the user knows it
 * @param noun - what it defines: `firing`
 * @param sound - what could be read, by name
 * @param faulty - line of the first fault, by name
 * @param unreadable - true if the headings of the file are faulty: then nothing in it counts as sound
 * @returns the register
 */
export function register<Value>(
  file: string,
  noun: string,
  sound: ReadonlyMap<string, Value>,
  faulty: ReadonlyMap<string, number>,
  unreadable: boolean,
): Register<Value> {
  const names = new Set([...sound.keys(), ...faulty.keys()]);
  const advice = nameAdvice([...names].sort(byName));
  const nothing = new Map<string, Value>();
  return { file, noun, sound: unreadable ? nothing : sound, faulty, unreadable, advice };
}

/**
 * What a name of another file stands for.
 *
 * @param source - where it is defined
 * @param name - the name as written
 * @returns the thing itself, or why it cannot be used
 */
export function lookUp<Value>(
  source: Register<Value>,
  name: string,
): { readonly value: Value } | { readonly problem: string } {
  const value = source.sound.get(name);
  if (value !== undefined) return { value };
  const { file, noun } = source;
  const line = source.faulty.get(name);
  if (source.unreadable) {
    return { problem: `expected a readable ${file} to look up the ${noun}, got ${quoted(name)}` };
  }
  if (line !== undefined) {
    const place = `see ${file}:${line}`;
    return { problem: `expected a ${noun} without faults, got ${quoted(name)}; ${place}` };
  }
  const advice = source.advice(name);
  return { problem: `expected a ${noun} of ${file}, got ${quoted(name)}${advice}` };
}

/** Collects rows by their names, and faults beside them. */
export interface Collected<Value> {
  readonly sound: Map<string, Value>;
  readonly faulty: Map<string, number>;
  readonly faults: Fault[];
}

/**
 * Sorts named rows into sound and faulty ones; a name that comes more than once is a fault of each of
 * its rows, and what it stands for is not known.
 *
 * @param rows - name, line, what the row says if it is sound, and its faults
 * @param file - the file as the user knows it
 * @param column - the column that holds the name
 * @param isWhole - false if the headings are faulty: two rows may then differ in what was not read
 * @returns sound values and lines of faulty rows by name, and all faults
 */
export function collectByName<Value extends object>(
  rows: readonly NamedRow<Value>[],
  file: string,
  column: string,
  isWhole = true,
): Collected<Value> {
  const collected: Collected<Value> = { sound: new Map(), faulty: new Map(), faults: [] };
  const given = () =>
    rows.map((row) => ({ ...row, said: () => (isWhole ? saidBy(row) : undefined) }));
  const repeated = areDistinct(rows) ? NO_FAULTS : repeatedNames(given(), file, column);
  for (const { name, line, value, faults } of rows) {
    const ofName = repeated.get(line);
    for (const fault of faults) collected.faults.push(fault);
    if (ofName !== undefined) collected.faults.push(ofName);
    if (name === undefined) continue;
    if (value !== undefined && ofName === undefined) collected.sound.set(name, value);
    else if (!collected.faulty.has(name)) collected.faulty.set(name, line);
  }
  return collected;
}

const NO_FAULTS: ReadonlyMap<number, Fault> = new Map();

function areDistinct(rows: readonly NamedRow<object>[]): boolean {
  const seen = new Set<string>();
  let named = 0;
  for (const { name } of rows) {
    if (name === undefined) continue;
    seen.add(name);
    named++;
  }
  return seen.size === named;
}

function saidBy<Value extends object>({ value }: NamedRow<Value>): string | undefined {
  return value === undefined ? undefined : JSON.stringify({ ...value, line: 0 });
}

export interface NamedRow<Value> {
  readonly name: string | undefined;
  /** How messages show the name, if it is not plain. */
  readonly label?: string;
  readonly line: number;
  /** Undefined where the row has faults. */
  readonly value: Value | undefined;
  readonly faults: readonly Fault[];
}
