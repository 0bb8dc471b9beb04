/** DEL, the C1 controls and line separators: JSON lets them stand, a terminal obeys them. */
const BARE_CONTROLS = /[\u007f-\u009f\u2028\u2029\u202a-\u202e\u2066-\u2069]/g;

/**
 * An answer as JSON text, keys in the order in which the answer was made.
 *
 * @param value - plain data
 * @returns indented text, ending with a newline
 * @throws {RangeError} if a number is not finite, naming where: JSON would turn it into null
 * @example
 * toJson({ tiles: 2 }); // '{\n  "tiles": 2\n}\n'
 */
export function toJson(value: unknown): string {
  const text = JSON.stringify(
    value,
    function finite(this: unknown, key: string, held: unknown): unknown {
      if (typeof held === 'number' && !Number.isFinite(held)) {
        throw new RangeError(`numbers must be finite to be written, got ${held} at "${key}"`);
      }
      return held;
    },
    2,
  );
  const codeOf = (character: string) =>
    `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`;
  return `${text.replace(BARE_CONTROLS, codeOf)}\n`;
}
