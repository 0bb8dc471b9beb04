/**
 * Bounds of what is read as an archive: far above any studio's, so that a wrong or hostile file
 * ends in a clear fault instead of filling the memory. No source: chosen here.
 */
export const LIMITS = Object.freeze({
  /** Bytes of one file. */
  fileBytes: 64 * 1024 * 1024,
  /** Rows of one file below its headings. */
  rows: 200_000,
  /** Columns of one file. */
  columns: 500,
  /** Characters of one cell. */
  cellCharacters: 10_000,
  /** Characters of the name of a tile, firing, recipe, material and the like. */
  nameCharacters: 200,
});
