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
  const text = JSON.stringify(value, undefined, INDENT);
  // What is not finite has become null: only then is it worth looking at every number.
  if (text.includes('null')) JSON.stringify(value, refuseInfinite);
  const codeOf = (character: string) =>
    `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`;
  return `${text.replace(BARE_CONTROLS, codeOf)}\n`;
}

const INDENT = 2;

function refuseInfinite(this: unknown, key: string, held: unknown): unknown {
  if (typeof held === 'number' && !Number.isFinite(held)) {
    throw new RangeError(`numbers must be finite to be written, got ${held} at "${key}"`);
  }
  return held;
}

/** Things of a list that make one piece of text. */
const THINGS_AT_ONCE = 500;

/**
 * The text of `toJson`, piece by piece: a long list need not be held, neither as values nor as text.
 *
 * @param answer - plain data but for lists that are made while they are read, such as a generator's; those become
 *   arrays
 * @returns pieces that joined are the text
 * @throws {RangeError} as `toJson`, when the piece is asked for
 * @example
 * [...jsonPieces({ tiles: 2, names: new Set(['a']) })].join(''); // '{\n  "tiles": 2,\n  "names": [\n    "a"\n  ]\n}\n'
 */
export function* jsonPieces(answer: Readonly<Record<string, unknown>>): Generator<string> {
  let before = '{\n';
  for (const [key, value] of Object.entries(answer)) {
    if (value === undefined) continue;
    yield before;
    if (isMadeWhileRead(value)) yield* listPieces(key, value);
    else yield member(key, value);
    before = ',\n';
  }
  yield before === ',\n' ? '\n}\n' : '{}\n';
}

function isMadeWhileRead(value: unknown): value is Iterable<unknown> {
  return (
    typeof value === 'object' && value !== null && Symbol.iterator in value && !Array.isArray(value)
  );
}

/** A key and its value as they stand in an object, without its braces. */
function member(key: string, value: unknown): string {
  return toJson({ [key]: value }).slice('{\n'.length, -'\n}\n'.length);
}

function* listPieces(key: string, things: Iterable<unknown>): Generator<string> {
  const opening = member(key, [0]).slice(0, -'    0\n  ]'.length);
  const closing = '\n  ]';
  const inner = (some: readonly unknown[]) =>
    member(key, some).slice(opening.length, -closing.length);
  let some: unknown[] = [];
  let before = opening;
  for (const thing of things) {
    some.push(thing);
    if (some.length < THINGS_AT_ONCE) continue;
    yield before + inner(some);
    before = ',\n';
    some = [];
  }
  if (some.length > 0) yield before + inner(some);
  yield some.length === 0 && before === opening ? member(key, []) : closing;
}
