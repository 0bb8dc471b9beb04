/** Cones that a studio asks about most. */
export const USUAL_CONES: readonly string[] = ['5', '6', '7'];

/**
 * Cones as the command line takes them: apart by spaces or commas.
 *
 * @param words - values of `--cone`
 * @returns cone indexes in the order asked, each once
 * @throws {ConeError} at the first that is no cone
 * @throws {UsageError} if there is none
 */
export async function conesOf(words: readonly string[]): Promise<number[]> {
  const { coneIndex, UsageError } = await import('../index.ts');
  const cones = words.flatMap((word) => word.split(',')).filter((cone) => cone.trim() !== '');
  if (cones.length === 0) {
    throw new UsageError('expected at least one cone after --cone, got none');
  }
  return [...new Set(cones.map((cone) => coneIndex(cone)))];
}
