/** Base of every error that a user can cause and mend; any other throw is a bug. */
export abstract class StudioError extends Error {
  /** Exit code of the command line: 2 usage, 3 unreadable input, 4 cannot be fitted or solved. */
  abstract readonly exitCode: number;
  constructor(
    message: string,
    /** What to do next, one sentence. */
    readonly hint?: string,
  ) {
    super(message);
    this.name = new.target.name;
  }
}

/** One fault of one cell (or of a whole row or file): where it stands and what is wrong. */
export interface Fault {
  /** File name inside the archive, as the user knows it. */
  readonly file: string;
  /** Line in the file, the header being line 1; 0 where the fault is of the whole file. */
  readonly line: number;
  /** Column heading, or '' where the fault is of the whole row. */
  readonly column: string;
  /** What was expected, what was found. */
  readonly message: string;
}

/**
 * A fault as one line of text.
 *
 * @param fault - the fault
 * @returns `file:line column: message`
 * @example
 * faultLine({ file: 'tiles.csv', line: 3, column: 'cone', message: 'expected a cone, got "x"' });
 * // 'tiles.csv:3 cone: expected a cone, got "x"'
 */
export function faultLine({ file, line, column, message }: Fault): string {
  const place = line > 0 ? `${file}:${line}` : file;
  return column === '' ? `${place}: ${message}` : `${place} ${column}: ${message}`;
}

/** Input files that cannot be read as they are; holds every fault found. */
export class ArchiveError extends StudioError {
  readonly exitCode = 3;
  constructor(
    readonly faults: readonly Fault[],
    hint?: string,
  ) {
    const count = faults.length === 1 ? '1 fault' : `${faults.length} faults`;
    super(`${count} in the input\n${faults.map((f) => `  ${faultLine(f)}`).join('\n')}`, hint);
  }
}

/** A composition from which no unity formula can be made. */
export class CompositionError extends StudioError {
  readonly exitCode = 3;
}

/** A cone that cannot be read. */
export class ConeError extends StudioError {
  readonly exitCode = 2;
}

/** A model file that is damaged or foreign. */
export class ModelFileError extends StudioError {
  readonly exitCode = 3;
}

/** A question that cannot be fitted or solved. */
export class UnsolvableError extends StudioError {
  readonly exitCode = 4;
}

/** A call of the command line that asks for something it cannot mean. */
export class UsageError extends StudioError {
  readonly exitCode = 2;
}
