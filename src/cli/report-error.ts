import { StudioError } from '../errors.ts';
import type { Io } from './io.ts';

/** Exit code of anything that is not the user's to mend. */
const BUG = 1;

/**
 * Tells of an error on the stream for messages.
 *
 * @param error - what was thrown
 * @param io - where to tell it
 * @returns exit code
 */
export async function reportError(error: unknown, io: Io): Promise<number> {
  if (error instanceof StudioError) {
    const hint = error.hint === undefined ? '' : `\n${error.hint}`;
    await tell(`coneshift: ${error.message}${hint}`, io);
    return error.exitCode;
  }
  const told = error instanceof Error ? (error.stack ?? error.message) : String(error);
  await tell(
    'coneshift: this is a bug in coneshift, not a fault of yours. Please report it, with the ' +
      `version (${io.version}), the command and these lines:`,
    io,
  );
  // A stack is for who mends it: its lines stay as they are.
  const { mappedStack } = await import('./mapped-stack.ts');
  io.err(`${safeLines(mappedStack(told))}\n`);
  return BUG;
}

/**
 * Tells something on the stream for messages, in lines that fit the terminal.
 *
 * @param text - one or more lines; what is set in stays so
 * @param io - where to tell it
 */
export async function tell(text: string, io: Pick<Io, 'columns' | 'err'>): Promise<void> {
  const { wrapped } = await import('../index.ts');
  for (const line of safeLines(text).split('\n')) {
    const first = /^ */.exec(line)?.[0] ?? '';
    io.err(`${wrapped(line, { columns: io.columns, first, next: `${first}  ` })}\n`);
  }
}

/**
 * Tells notes on the input, each once.
 *
 * @param notes - the notes
 * @param io - where to tell them
 */
export async function tellNotes(notes: readonly string[], io: Io): Promise<void> {
  for (const note of notes) await tell(`coneshift: note: ${note}`, io);
}

/**
 * A text of several lines in which no character can move the cursor but the line ends.
 *
 * @param text - any text
 * @returns the text, other control characters written as their code
 */
export function safeLines(text: string): string {
  return text.replace(/[^\P{C}\n]/gu, (character) => {
    const code = (character.codePointAt(0) ?? 0).toString(16);
    return code.length <= 2 ? `\\x${code.padStart(2, '0')}` : `\\u{${code}}`;
  });
}
