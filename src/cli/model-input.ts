import type { Model } from '../index.ts';
import type { Io } from './io.ts';

/**
 * The model that a command was given.
 *
 * @param path - file written by fit, `-` for standard input
 * @param io - where to read
 * @returns the model
 * @throws {UnreadableError} if there is no such file
 * @throws {ModelFileError} if it is no model, or damaged
 */
export async function modelAt(path: string, io: Io): Promise<Model> {
  const { parseModel } = await import('../index.ts');
  return parseModel(await io.readText(path));
}
