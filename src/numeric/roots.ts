/** Enough for any bracket of doubles: each pair of steps at least halves it. */
const MOST_STEPS = 200;

/**
 * Where a continuous function changes sign.
 *
 * @param f - continuous on [low, high]
 * @param low - one end of the bracket
 * @param high - the other end; f must not have the same sign there
 * @param tolerance - width of the answer, in units of x
 * @returns x with f(x) = 0 within the tolerance; an end where f is 0 there, and the nearer end to
 *   zero where both ends have one sign (the caller's quantile lies outside the bracket)
 * @example
 * findRoot((x) => x * x - 2, 0, 2, 1e-12); // ~1.414214
 *
 * Source: R. P. Brent, Algorithms for Minimization without Derivatives, 1973, chapter 4.
 */
export function findRoot(
  f: (x: number) => number,
  low: number,
  high: number,
  tolerance: number,
): number {
  let a = low;
  let b = high;
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fa > 0 === fb > 0) return Math.abs(fa) < Math.abs(fb) ? a : b;
  let c = a;
  let fc = fa;
  let step = b - a;
  let previousStep = step;
  for (let i = 0; i < MOST_STEPS; i++) {
    if (fb > 0 === fc > 0) {
      c = a;
      fc = fa;
      step = previousStep = b - a;
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      [a, b, c] = [b, c, b];
      [fa, fb, fc] = [fb, fc, fb];
    }
    const least = 2 * Number.EPSILON * Math.abs(b) + tolerance / 2;
    const half = (c - b) / 2;
    if (Math.abs(half) <= least || fb === 0) return b;
    const tried = Math.abs(previousStep) >= least && Math.abs(fa) > Math.abs(fb);
    const proposed = tried ? interpolatedStep(a, b, c, fa, fb, fc) : Number.NaN;
    const usable =
      Math.abs(2 * proposed) <
        Math.min(Math.abs(3 * half) - Math.abs(least), Math.abs(previousStep)) &&
      proposed * half > 0;
    [previousStep, step] = usable ? [step, proposed] : [half, half];
    a = b;
    fa = fb;
    b += Math.abs(step) > least ? step : Math.sign(half) * least;
    fb = f(b);
  }
  return b;
}

/** Inverse quadratic interpolation through three points, the secant through two. */
function interpolatedStep(
  a: number,
  b: number,
  c: number,
  fa: number,
  fb: number,
  fc: number,
): number {
  const s = fb / fa;
  if (a === c) return ((b - c) * s) / (1 - s);
  const q = fa / fc;
  const r = fb / fc;
  const numerator = s * ((c - b) * q * (q - r) - (b - a) * (r - 1));
  return -numerator / ((q - 1) * (r - 1) * (s - 1));
}
