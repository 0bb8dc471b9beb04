// Frozen: the starting point of the model, kept unchanged as the yardstick that later models are
// measured against. Do not improve it; `src/model` is where the model is improved.
import { choleskyFactor, choleskySolve, dot } from '../../../src/numeric/linalg.ts';
import { addOuterProduct, newtonSystem, type NewtonSystem } from './newton-system.ts';
import type { Whitened } from './whitened.ts';

/** A place in the whitened problem. */
export interface WhitePoint {
  readonly theta: Float64Array;
  readonly loads: Float64Array;
  readonly logDensity: number;
}

/** The step from a place to the mode of its quadratic approximation. */
export interface NewtonStep {
  readonly theta: Float64Array;
  readonly loads: Float64Array;
  /** Gradient times step. */
  readonly decrement: number;
  readonly factor: Float64Array;
  readonly loadPrecision: Float64Array;
  readonly coupling: Float64Array;
}

/** Newton's step at a place. */
export function stepAt(problem: Whitened, { theta, loads }: WhitePoint): NewtonStep {
  return solveStep(newtonSystem(problem, theta, loads));
}

/** Eliminates the loads, whose block is diagonal, solves for the weights, and puts the loads back. */
function solveStep(system: NewtonSystem): NewtonStep {
  const { size, loadCount, gradient, loadGradient, precision, loadPrecision, coupling } = system;
  const reduced = Float64Array.from(precision);
  const right = Float64Array.from(gradient);
  for (let l = 0; l < loadCount; l++) {
    const scale = 1 / loadPrecision[l];
    const base = l * size;
    addOuterProduct(reduced, right, coupling, base, size, -scale, -loadGradient[l] * scale);
  }
  const factor = choleskyFactor(reduced, size);
  const theta = choleskySolve(factor, right);
  const loads = Float64Array.from(loadPrecision, (d, l) => {
    const row = coupling.subarray(l * size, (l + 1) * size);
    return (loadGradient[l] - dot(row, theta)) / d;
  });
  return {
    theta,
    loads,
    decrement: dot(gradient, theta) + dot(loadGradient, loads),
    factor,
    loadPrecision,
    coupling,
  };
}
