import type { Fault } from '../errors.ts';
import { quoted } from './found-text.ts';
import { nameAdvice, type NameAdvice } from './nearest-name.ts';

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
  const advice = nameAdvice(new Set([...sound.keys(), ...faulty.keys()]));
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
 * Sorts named rows into sound and faulty ones; a name that comes twice is a fault of its second row.
 *
 * @param rows - name, line, what the row says if it is sound, and its faults
 * @param file - the file as the user knows it
 * @param column - the column that holds the name
 * @returns sound values and lines of faulty rows by name, and all faults
 */
export function collectByName<Value>(
  rows: Iterable<NamedRow<Value>>,
  file: string,
  column: string,
): Collected<Value> {
  const collected: Collected<Value> = { sound: new Map(), faulty: new Map(), faults: [] };
  const firstLine = new Map<string, number>();
  for (const { name, label = name ?? '', line, value, faults } of rows) {
    const first = name === undefined ? undefined : firstLine.get(name);
    const repeated = first === undefined ? [] : [repeatedName(file, line, column, label, first)];
    collected.faults.push(...faults, ...repeated);
    if (name === undefined || first !== undefined) continue;
    firstLine.set(name, line);
    if (value === undefined) collected.faulty.set(name, line);
    else collected.sound.set(name, value);
  }
  return collected;
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

/**
 * The fault of a name that was used before.
 *
 * @param file - file
 * @param line - line of the second use
 * @param column - column of the name
 * @param name - the name
 * @param first - line of the first use
 * @returns a fault that names both lines
 */
export function repeatedName(
  file: string,
  line: number,
  column: string,
  name: string,
  first: number,
): Fault {
  const message = `expected each ${column} once, got ${quoted(name)} as in line ${first}`;
  return { file, line, column, message };
}
