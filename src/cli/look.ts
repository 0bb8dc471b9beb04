import { styleText } from 'node:util';
import type { Look } from '../index.ts';
import type { Io } from './io.ts';

/**
 * How pages look on this terminal: headings bold where it bears codes.
 *
 * @param io - the terminal
 * @returns width and marking
 */
export function lookOf({ columns, colour }: Pick<Io, 'columns' | 'colour'>): Look {
  const strong = (text: string) => styleText('bold', text, { validateStream: false });
  return { columns, strong: colour ? strong : (text) => text };
}
