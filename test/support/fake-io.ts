import { UnreadableError } from '../../src/cli/cli-errors.ts';
import { STDIN, type Io, type PathKind } from '../../src/cli/io.ts';
import { bytesOf } from './builders.ts';

/** A world in memory: what a command may read, and what it did. */
export interface FakeIo extends Io {
  readonly stdout: () => string;
  readonly stderr: () => string;
  /** Texts by path, of files written by the command. */
  readonly written: ReadonlyMap<string, string>;
  /** Paths opened, in order. */
  readonly opened: readonly string[];
}

export interface FakeWorld {
  /** Files by path; folders are what the paths imply. */
  readonly files?: Readonly<Record<string, string | Uint8Array>>;
  readonly stdin?: string;
  readonly columns?: number;
  readonly colour?: boolean;
}

export function fakeIo({
  files = {},
  stdin = '',
  columns = 80,
  colour = false,
}: FakeWorld): FakeIo {
  const output = { out: '', err: '' };
  const written = new Map<string, string>();
  const opened: string[] = [];
  const contents = (path: string): string | Uint8Array | undefined =>
    path === STDIN ? stdin : (written.get(path) ?? files[path]);
  const readBytes = (path: string) => {
    opened.push(path);
    const content = contents(path);
    if (content === undefined) return Promise.reject(new UnreadableError(`no file "${path}"`));
    return Promise.resolve(typeof content === 'string' ? bytesOf(content) : content);
  };
  const folderOf = (path: string) => (path.endsWith('/') ? path : `${path}/`);
  const kindOf = (path: string): PathKind => {
    if (contents(path) !== undefined) return 'file';
    const isFolder = Object.keys(files).some((file) => file.startsWith(folderOf(path)));
    return isFolder ? 'folder' : 'absent';
  };
  return {
    version: '0.0.0-test',
    columns,
    colour,
    readText: async (path) => new TextDecoder().decode(await readBytes(path)),
    readBytes,
    kindOf: (path) => Promise.resolve(kindOf(path)),
    listFolder: (path) => {
      const within = Object.keys(files).filter((file) => file.startsWith(folderOf(path)));
      const names = within.map((file) => file.slice(folderOf(path).length));
      return Promise.resolve(names.filter((name) => !name.includes('/')).sort());
    },
    writeFileWhole: (path, text) => {
      written.set(path, text);
      return Promise.resolve();
    },
    out: (text) => {
      output.out += text;
    },
    err: (text) => {
      output.err += text;
    },
    stdout: () => output.out,
    stderr: () => output.err,
    written,
    opened,
  };
}
