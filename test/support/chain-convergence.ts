import { mean } from '../../src/numeric/summary.ts';

/** How far several chains agree on one quantity, and how many independent draws they are worth. */
export interface Convergence {
  /** Potential scale reduction: near 1 where the halves of all chains agree. */
  readonly rHat: number;
  readonly effectiveDraws: number;
}

/**
 * Split R-hat and effective number of draws.
 *
 * @param chains - [chains][draws], of equal length, at least 4 draws
 * @returns both
 *
 * Source: A. Gelman et al., Bayesian Data Analysis, 3rd ed. 2013, sections 11.4 and 11.5, with Geyer's
 * monotone sequence of paired autocorrelations.
 */
export function convergence(chains: readonly (readonly number[])[]): Convergence {
  const half = Math.floor(chains[0].length / 2);
  const halves = chains.flatMap((chain) => [chain.slice(0, half), chain.slice(half, 2 * half)]);
  const means = halves.map(mean);
  const within = mean(halves.map((own, c) => covarianceAt(own, means[c], 0) * (half / (half - 1))));
  const grand = mean(means);
  const between = means.reduce((sum, m) => sum + (m - grand) ** 2, 0) / (means.length - 1);
  const total = ((half - 1) / half) * within + between;
  if (!(total > 0)) return { rHat: 1, effectiveDraws: halves.length * half };
  let time = -1;
  let least = Infinity;
  for (let lag = 0; lag + 1 < half; lag += 2) {
    const pair = [lag, lag + 1].reduce((sum, t) => {
      const auto = mean(halves.map((own, c) => covarianceAt(own, means[c], t)));
      return sum + 1 - (within - auto) / total;
    }, 0);
    if (!(pair > 0)) break;
    least = Math.min(least, pair);
    time += 2 * least;
  }
  return { rHat: Math.sqrt(total / within), effectiveDraws: (halves.length * half) / time };
}

function covarianceAt(values: readonly number[], centre: number, lag: number): number {
  let sum = 0;
  for (let i = lag; i < values.length; i++) {
    sum += (values[i] - centre) * (values[i - lag] - centre);
  }
  return sum / values.length;
}
