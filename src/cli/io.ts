/** What a path leads to. */
export type PathKind = 'absent' | 'file' | 'folder' | 'other';

/** Everything that a command may touch outside the library; tests hand in one of their own. */
export interface Io {
  /** Version of coneshift. */
  readonly version: string;
  /** Columns of the terminal, 80 where there is none. */
  readonly columns: number;
  /** Whether standard output bears terminal codes. */
  readonly colour: boolean;
  /** Text of a file in UTF-8; `-` is standard input. */
  readonly readText: (path: string) => Promise<string>;
  /** Bytes of a file; `-` is standard input. */
  readonly readBytes: (path: string) => Promise<Uint8Array>;
  readonly kindOf: (path: string) => Promise<PathKind>;
  /** Bare names of the files in a folder, in order. */
  readonly listFolder: (path: string) => Promise<readonly string[]>;
  /** Writes a file whole: written beside, synced, renamed. On failure the old file stays. */
  readonly writeFileWhole: (path: string, text: string) => Promise<void>;
  /** Results. */
  readonly out: (text: string) => void;
  /** Messages and progress. */
  readonly err: (text: string) => void;
}

/** Stands for standard input where a file is read. */
export const STDIN = '-';
