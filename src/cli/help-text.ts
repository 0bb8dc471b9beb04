import { Help } from 'commander';

/** Help is not wider than this, however wide the terminal. */
const WIDEST = 80;
export const LEAST_HELP_COLUMNS = 40;

/**
 * Text below the options of a command, in lines that fit the terminal.
 *
 * @param text - paragraphs apart by blank lines; those with set-in lines, as examples, stay as they are
 * @param columns - of the terminal
 * @returns the text
 */
export function helpText(text: string, columns: number): string {
  const width = Math.min(WIDEST, Math.max(LEAST_HELP_COLUMNS, columns));
  const help = new Help();
  const fitted = text.split('\n\n').map((paragraph) => {
    if (/^ /m.test(paragraph)) return paragraph;
    const [, start = '', words = ''] = /^(\n*)([\s\S]*)$/.exec(paragraph) ?? [];
    return start + help.boxWrap(words.replace(/\n/g, ' '), width);
  });
  return fitted.join('\n\n');
}
