import { productsModule, TILE } from './cross-products-loop.ts';
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
const FIRST_PAGES = 16;
const BYTES = 8;

/** The loop made ready. */
export class ProductLoop {
  readonly #exports: WasmExports & HasMemory;
  #numbers: Float64Array;

  constructor(exports: WasmExports & HasMemory) {
    this.#exports = exports;
    this.#numbers = new Float64Array(exports.memory.buffer);
  }

  /**
   * Its memory, as far as it is needed.
   *
   * @param wanted - how many numbers at least
   * @returns the numbers; what was there before stays
   */
  numbers(wanted: number): Float64Array {
    const missing = wanted - this.#numbers.length;
    if (missing > 0) {
      this.#exports.memory.grow(Math.ceil(missing / PAGE_NUMBERS));
      this.#numbers = new Float64Array(this.#exports.memory.buffer);
    }
    return this.#numbers;
  }

  /**
   * Adds products: see `productsModule`. Places and strides are in numbers.
   *
   * @param left - where the left columns stand, and the stride of their rows
   * @param right - the same of the right ones
   * @param sums - the same of the sums
   * @param shape - terms of each sum, rows and columns of the sums
   */
  run(left: Place, right: Place, sums: Place, { terms, rows, columns, sparse }: Shape): void {
    this.#exports['products']!(
      BYTES * left.at,
      BYTES * right.at,
      BYTES * sums.at,
      sparse === 'terms' ? TILE : terms,
      BYTES * left.stride,
      BYTES * right.stride,
      BYTES * sums.stride,
      rows,
      sparse === 'sums' ? 1 : columns,
      sparse === 'sums' ? 1 : 0,
      sparse === 'terms' ? 1 : 0,
    );
  }
}

/** Where a matrix stands in the loop's memory. */
export interface Place {
  readonly at: number;
  readonly stride: number;
}

/** How much there is to do. */
interface Shape {
  readonly terms: number;
  readonly rows: number;
  readonly columns: number;
  /**
   * `sums`: the tiles above the diagonal are left out. `terms`: the right matrix is 0 below its diagonal, and its terms there
   * are left out; both matrices are then read, and must hold zeros, up to a whole tile of terms.
   */
  readonly sparse?: 'sums' | 'terms';
}

let made: { readonly loop: ProductLoop | undefined } | undefined;

/**
 * The loop, made at the first call.
 *
 * @returns the loop; undefined where the engine has no WebAssembly, or may not compile it
 */
export function productLoop(): ProductLoop | undefined {
  made ??= { loop: madeLoop() };
  return made.loop;
}

function madeLoop(): ProductLoop | undefined {
  const engine = (globalThis as { readonly WebAssembly?: WasmEngine }).WebAssembly;
  if (engine === undefined) return undefined;
  try {
    return new ProductLoop(
      new engine.Instance(new engine.Module(productsModule(FIRST_PAGES))).exports,
    );
  } catch {
    return undefined;
  }
}

/**
 * A size in whole tiles.
 *
 * @param size - rows or columns
 * @returns as many or up to 3 more
 */
export function inTiles(size: number): number {
  return Math.ceil(size / TILE) * TILE;
}
