/** What one observation says of its log-odds, averaged over a Gaussian for them. */
export interface Expected {
  /** E[ln p(outcome | log-odds)] */
  value: number;
  /** Expected first derivative. */
  slope: number;
  /** Minus the expected second derivative; below 0 where the verdict is doubtful. */
  curvature: number;
}

/**
 * Gauss-Hermite nodes and shares for a standard normal weight, nine of them: exact for polynomials of
 * degree 17. Source: P. J. Davis and P. Rabinowitz, Methods of Numerical Integration, 2nd ed. 1984,
 * section 3.6; checked by their moments in the tests.
 */
export const HERMITE_NODES: readonly number[] = [
  0, 1.0232556637891326, 2.0768479786778302, 3.2054290028564703, 4.5127458633997826,
];
export const HERMITE_SHARES: readonly number[] = [
  0.40634920634920635, 0.24409750289493906, 0.049916406765217878, 0.0027891413212317683,
  0.000022345844007746605,
];

/** Below so small an sd the Gaussian is a point. */
const LEAST_SD = 1e-9;

/**
 * Log likelihood of a verdict that may be wrong, and its derivatives, averaged over log-odds known up
 * to a Gaussian error.
 *
 *     p(yes | log-odds) = flipped + (1 - 2 flipped) sigmoid(log-odds)
 *
 * @param mean - of the log-odds
 * @param sd - of the log-odds, 0 for a plain likelihood
 * @param outcome - 1 yes, 0 no, or the share of yes
 * @param flipped - share of verdicts that are the wrong way round, in [0, 1/2)
 * @param into - where the answer is written
 */
export function expectedLikelihood(
  mean: number,
  sd: number,
  outcome: number,
  flipped: number,
  into: Expected,
): void {
  into.value = 0;
  into.slope = 0;
  into.curvature = 0;
  if (sd < LEAST_SD) {
    addLikelihood(mean, 1, outcome, flipped, into);
  } else {
    addLikelihood(mean, HERMITE_SHARES[0]!, outcome, flipped, into);
    for (let k = 1; k < HERMITE_NODES.length; k++) {
      const step = sd * HERMITE_NODES[k]!;
      addLikelihood(mean + step, HERMITE_SHARES[k]!, outcome, flipped, into);
      addLikelihood(mean - step, HERMITE_SHARES[k]!, outcome, flipped, into);
    }
  }
}

function addLikelihood(
  logOdds: number,
  share: number,
  outcome: number,
  flipped: number,
  into: Expected,
): void {
  const odds = Math.exp(-Math.abs(logOdds));
  const larger = 1 / (1 + odds);
  const smaller = odds * larger;
  const yes = logOdds > 0 ? larger : smaller;
  const no = logOdds > 0 ? smaller : larger;
  if (flipped === 0) {
    const logLarger = -Math.log1p(odds);
    const logYes = logOdds > 0 ? logLarger : logLarger + logOdds;
    const logNo = logOdds > 0 ? logLarger - logOdds : logLarger;
    into.value += share * (outcome * logYes + (1 - outcome) * logNo);
    // Not `outcome - yes`, which loses every digit where yes is near 1.
    into.slope += share * (outcome * no - (1 - outcome) * yes);
    into.curvature += share * yes * no;
    return;
  }
  const kept = 1 - 2 * flipped;
  const density = kept * yes * no;
  const bend = density * (no - yes);
  // Nearly all outcomes are whole: one side of the logarithms and quotients is then enough.
  if (outcome > 0) addSide(flipped + kept * yes, density, bend, share * outcome, into);
  if (outcome < 1) addSide(flipped + kept * no, -density, -bend, share * (1 - outcome), into);
}

/** Adds what is said by a verdict of probability `said`, which changes by `slope` and `bend`. */
function addSide(said: number, slope: number, bend: number, share: number, into: Expected): void {
  const relative = slope / said;
  into.value += share * Math.log(said);
  into.slope += share * relative;
  into.curvature += share * (relative * relative - bend / said);
}
