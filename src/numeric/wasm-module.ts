/**
 * Just enough of WebAssembly's binary format to write small loops over numbers in it.
 *
 * Source: WebAssembly Core Specification 2.0, W3C 2022, chapter 5 (binary format).
 */
export type Code = number | readonly Code[];

const I32 = 0x7f;
const V128 = 0x7b;
const EMPTY_BLOCK = 0x40;
const END = 0x0b;

/** A number below 2^31 in groups of seven bits, the lowest first. */
function leb(value: number): Code {
  return value < 0x80 ? value : [(value & 0x7f) | 0x80, leb(value >>> 7)];
}

/** As `leb`, where bit 6 of the last group is the sign. */
function signedLeb(value: number): Code {
  return value < 0x40 ? value : [(value & 0x7f) | 0x80, signedLeb(value >>> 7)];
}

const get = (local: number): Code => [0x20, leb(local)];
const simd = (opcode: number): Code => [0xfd, leb(opcode)];
const at = (offset: number): Code => [3, leb(offset)];

/** Instructions, named as in the specification; operands stand before the instruction. */
export const op = {
  get,
  set: (local: number, value: Code): Code => [value, 0x21, leb(local)],
  constant: (value: number): Code => [0x41, signedLeb(value)],
  add: (a: Code, b: Code): Code => [a, b, 0x6a],
  multiply: (a: Code, b: Code): Code => [a, b, 0x6c],
  isBelow: (a: Code, b: Code): Code => [a, b, 0x49],
  /** Runs the body, and again as long as the condition holds after it. */
  repeat: (body: Code, condition: Code): Code => [
    [0x03, EMPTY_BLOCK],
    [body, condition],
    [0x0d, 0, END],
  ],
  /** Two neighbouring numbers of 64 bits. */
  loadPair: (address: Code, offset: number): Code => [address, simd(0), at(offset)],
  /** One number of 64 bits, twice. */
  loadTwice: (address: Code, offset: number): Code => [address, simd(10), at(offset)],
  storePair: (address: Code, offset: number, value: Code): Code => [
    [address, value],
    [simd(11), at(offset)],
  ],
  addPairs: (a: Code, b: Code): Code => [a, b, simd(0xf0)],
  multiplyPairs: (a: Code, b: Code): Code => [a, b, simd(0xf2)],
} as const;

/** One function: its parameters and first locals are whole numbers, its other locals pairs. */
export interface WasmFunction {
  readonly name: string;
  readonly parameters: number;
  readonly wholeLocals: number;
  readonly pairLocals: number;
  readonly body: Code;
}

/** What a module of such functions gives. */
export type WasmExports = Readonly<Record<string, (...whole: number[]) => void>>;

function bytesOf(code: Code, bytes: number[] = []): number[] {
  if (typeof code === 'number') bytes.push(code);
  else for (const part of code) bytesOf(part, bytes);
  return bytes;
}

const list = (items: readonly Code[]): Code => [leb(items.length), items];
const sized = (content: Code): Code => {
  const bytes = bytesOf(content);
  return [leb(bytes.length), bytes];
};
const section = (id: number, items: readonly Code[]): Code => [id, sized(list(items))];
const text = (name: string): Code => sized([...new TextEncoder().encode(name)]);

/**
 * A module in binary form. It holds a memory, exported as `memory`, and the functions.
 *
 * @param functions - what it can do
 * @param pages - size of the memory, in 64 KiB
 * @returns its bytes
 */
export function wasmBytes(functions: readonly WasmFunction[], pages: number): Uint8Array {
  const types = functions.map(({ parameters }) => [
    0x60,
    list(new Array<Code>(parameters).fill(I32)),
    list([]),
  ]);
  const bodies = functions.map(({ wholeLocals, pairLocals, body }) => {
    const locals = list([
      [leb(wholeLocals), I32],
      [leb(pairLocals), V128],
    ]);
    return sized([locals, body, END]);
  });
  const exported = functions.map(({ name }, i) => [text(name), 0, leb(i)]);
  return Uint8Array.from(
    bytesOf([
      [0, 0x61, 0x73, 0x6d, 1, 0, 0, 0],
      section(1, types),
      section(
        3,
        functions.map((_, i) => leb(i)),
      ),
      section(5, [[0, leb(pages)]]),
      section(7, [[text('memory'), 2, 0], ...exported]),
      section(10, bodies),
    ]),
  );
}
