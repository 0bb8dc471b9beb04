import { crossProductsModule, TILE } from './cross-products-loop.ts';
import type { WasmExports } from './wasm-module.ts';

/** What is used of the engine's WebAssembly, which the types of Node leave out. */
interface WasmEngine {
  readonly Module: new (bytes: Uint8Array) => object;
  readonly Instance: new (module: object) => { readonly exports: WasmExports & HasMemory };
}
interface HasMemory {
  readonly memory: { readonly buffer: ArrayBuffer; readonly grow: (pages: number) => number };
}

const PAGE_NUMBERS = 8192;
const FIRST_PAGES = 8;
const BYTES = 8;
/** So many rows at a time stay in the processor's nearest memory. */
const ROWS_AT_ONCE = 32;

/** The loop made ready, and its memory seen as numbers; undefined where the engine has none. */
interface Loop {
  readonly exports: WasmExports & HasMemory;
  numbers: Float64Array;
}

let made: { readonly loop: Loop | undefined } | undefined;

function readyLoop(): Loop | undefined {
  made ??= { loop: madeLoop() };
  return made.loop;
}

/** An engine may lack WebAssembly, or may not be allowed to compile it. */
function madeLoop(): Loop | undefined {
  const engine = (globalThis as { readonly WebAssembly?: WasmEngine }).WebAssembly;
  if (engine === undefined) return undefined;
  try {
    const { exports } = new engine.Instance(new engine.Module(crossProductsModule(FIRST_PAGES)));
    return { exports, numbers: new Float64Array(exports.memory.buffer) };
  } catch {
    return undefined;
  }
}

/**
 * Adds the rows' weighted cross products: the inner loop of the fit, which takes most of its time.
 *
 * Each sum starts at 0 and takes row after row before it is added. It runs in WebAssembly, four times as fast
 * as the plain loop, and gives the same numbers to the last bit.
 *
 * @param rows - [rows][size]
 * @param size - columns
 * @param weights - of each row
 * @param products - lower triangle, changed
 */
export function addCrossProducts(
  rows: Float64Array,
  size: number,
  weights: Float64Array,
  products: Float64Array,
): void {
  if (size === 0 || weights.length === 0) return;
  const loop = readyLoop();
  if (loop === undefined) addPlainly(rows, size, weights, products);
  else addByLoop(loop, rows, size, weights, products);
}

function addByLoop(
  loop: Loop,
  rows: Float64Array,
  size: number,
  weights: Float64Array,
  products: Float64Array,
): void {
  const padded = Math.ceil(size / TILE) * TILE;
  const plainAt = ROWS_AT_ONCE * size + TILE;
  const sumsAt = 2 * plainAt;
  const numbers = withRoom(loop, sumsAt + padded * padded);
  numbers.fill(0, sumsAt, sumsAt + padded * padded);
  for (let first = 0; first < weights.length; first += ROWS_AT_ONCE) {
    const count = Math.min(ROWS_AT_ONCE, weights.length - first);
    const chunk = rows.subarray(first * size, (first + count) * size);
    numbers.set(chunk, plainAt);
    for (let i = 0, at = 0; i < count; i++) {
      const weight = weights[first + i]!;
      for (let j = 0; j < size; j++, at++) numbers[at] = weight * chunk[at]!;
    }
    loop.exports['products']!(0, BYTES * plainAt, BYTES * sumsAt, count, size, padded);
  }
  for (let j = 0, cell = 0; j < size; j++) {
    for (let k = 0; k <= j; k++) products[cell++]! += numbers[sumsAt + j * padded + k]!;
  }
}

function withRoom(loop: Loop, wanted: number): Float64Array {
  const missing = wanted - loop.numbers.length;
  if (missing > 0) {
    loop.exports.memory.grow(Math.ceil(missing / PAGE_NUMBERS));
    loop.numbers = new Float64Array(loop.exports.memory.buffer);
  }
  return loop.numbers;
}

/**
 * The same without WebAssembly, for engines that have none.
 *
 * @param rows - [rows][size]
 * @param size - columns
 * @param weights - of each row
 * @param products - lower triangle, changed
 */
export function addPlainly(
  rows: Float64Array,
  size: number,
  weights: Float64Array,
  products: Float64Array,
): void {
  const sums = new Float64Array(products.length);
  for (let i = 0; i < weights.length; i++) {
    const base = i * size;
    for (let j = 0, cell = 0; j < size; j++) {
      const factor = weights[i]! * rows[base + j]!;
      for (let k = 0; k <= j; k++) sums[cell++]! += factor * rows[base + k]!;
    }
  }
  for (let cell = 0; cell < sums.length; cell++) products[cell]! += sums[cell]!;
}
