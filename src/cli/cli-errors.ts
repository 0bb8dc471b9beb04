import { StudioError } from '../errors.ts';

/** A file or folder that cannot be read. */
export class UnreadableError extends StudioError {
  readonly exitCode = 3;
}

/** A file that cannot be written: the disk is full, the folder absent or closed. */
export class UnwritableError extends StudioError {
  readonly exitCode = 3;
}
