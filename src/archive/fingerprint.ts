import { createHash } from 'node:crypto';

/**
 * A name for exactly these files: another byte, or another file name, gives another.
 *
 * @param files - bytes by file name
 * @returns `sha256:` and 64 hex digits, whatever the order of the files
 * @example
 * fingerprint(new Map());
 * // 'sha256:e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855'
 *
 * Source: SHA-256, FIPS 180-4; over an empty archive it is the hash of no bytes.
 */
export function fingerprint(files: ReadonlyMap<string, Uint8Array>): string {
  const hash = createHash('sha256');
  for (const name of [...files.keys()].sort()) {
    for (const part of [new TextEncoder().encode(name), files.get(name) ?? new Uint8Array()]) {
      // With its length before it no byte can pass from a name into a file or the reverse.
      hash.update(`${part.length}:`);
      hash.update(part);
    }
  }
  return `sha256:${hash.digest('hex')}`;
}
