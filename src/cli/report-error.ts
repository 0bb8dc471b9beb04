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
    const { wrapped } = await import('../index.ts');
    const hint = error.hint === undefined ? '' : `\n${error.hint}`;
    const lines = safeLines(`coneshift: ${error.message}${hint}`).split('\n');
    for (const line of lines) {
      const first = /^ */.exec(line)?.[0] ?? '';
      io.err(`${wrapped(line, { columns: io.columns, first, next: `${first}  ` })}\n`);
    }
    return error.exitCode;
  }
  const told = error instanceof Error ? (error.stack ?? error.message) : String(error);
  io.err(
    `coneshift: this is a bug in coneshift, not a fault of yours. Please report it, with the\n`,
  );
  io.err(`version (${io.version}), the command and these lines:\n${safeLines(told)}\n`);
  return BUG;
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
