import { CompositionError, UsageError } from '../errors.ts';

/**
 * Reads words of the command line, all of them, before any of their faults is told.
 *
 * What a file holds is the file's fault; what the command line says is one of usage.
 *
 * @param words - as given
 * @param read - reads one word
 * @returns what was read, in the order of the words
 * @throws {UsageError} with the faults of all words that cannot be read as a composition
 */
export function asUsage<Read>(
  words: readonly string[],
  read: (word: string, index: number) => Read,
): Read[] {
  const values: Read[] = [];
  const faults: CompositionError[] = [];
  for (const [index, word] of words.entries()) {
    try {
      values.push(read(word, index));
    } catch (error) {
      if (!(error instanceof CompositionError)) throw error;
      faults.push(error);
    }
  }
  if (faults.length === 0) return values;
  const hints = new Set(faults.flatMap(({ hint }) => hint ?? []));
  throw new UsageError(
    faults.map(({ message }) => message).join('\n'),
    [...hints].join(' ') || undefined,
  );
}
