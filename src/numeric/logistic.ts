/**
 * The logistic function 1 / (1 + exp(-x)), without overflow at either end.
 *
 * @param logOdds - dimensionless
 * @returns probability in [0, 1]
 * @example
 * sigmoid(0); // 0.5
 * sigmoid(-800); // 0
 */
export function sigmoid(logOdds: number): number {
  if (logOdds >= 0) return 1 / (1 + Math.exp(-logOdds));
  const odds = Math.exp(logOdds);
  return odds / (1 + odds);
}

/**
 * ln(1 + exp(x)), exact at both ends.
 *
 * @param x - any number
 * @returns the value; relative error of a few ulp
 * @example
 * log1pExp(0); // ~0.693147
 * log1pExp(800); // 800
 */
export function log1pExp(x: number): number {
  return x > 0 ? x + Math.log1p(Math.exp(-x)) : Math.log1p(Math.exp(x));
}

/**
 * Log-odds of a probability.
 *
 * @param probability - in [0, 1]
 * @returns ln(p / (1 - p)); -Infinity at 0, Infinity at 1
 * @example
 * logit(0.5); // 0
 */
export function logit(probability: number): number {
  return Math.log(probability) - Math.log1p(-probability);
}
