// Published maximum-likelihood fits, reached by a prior so wide that it does not count.
// Sources and their status: published-fits.json beside this file.
import { describe, expect, it } from 'vitest';
import { log1pExp } from '../../../src/numeric/logistic.ts';
import { logisticPosterior, type LogisticData } from '../../../src/model/logistic.ts';
import { dataSet, logOddsOf, symmetric } from './data-sets.ts';
import reference from './published-fits.json' with { type: 'json' };

/** The value as the source prints it: rounded to as many decimals as the printed text has. */
function asPrinted(value: number, printed: string): string {
  return value.toFixed(printed.split('.')[1].length);
}

function xLogX(x: number): number {
  return x === 0 ? 0 : x * Math.log(x);
}

/** Twice the log likelihood that the fit falls short of one parameter a row. */
function deviance({ rows, outcome, weight }: LogisticData, mean: readonly number[]): number {
  const terms = logOddsOf(rows, mean).map((logOdds, i) => {
    const y = outcome[i];
    const perfect = xLogX(y) + xLogX(1 - y);
    const fitted = -y * log1pExp(-logOdds) - (1 - y) * log1pExp(logOdds);
    return 2 * (weight?.[i] ?? 1) * (perfect - fitted);
  });
  return terms.reduce((sum, term) => sum + term, 0);
}

describe.each(reference.fits)('$name ($source)', ({ data: name, ...printed }) => {
  const data = dataSet(name);
  const columns = data.rows[0].length;
  const fit = logisticPosterior(data, {
    mean: Array<number>(columns).fill(0),
    sd: Array<number>(columns).fill(reference.priorSd),
  });

  it('reads the same to the last printed digit of every coefficient', () => {
    expect(printed.mean).toHaveLength(columns);
    expect(fit.mean.map((value, i) => asPrinted(value, printed.mean[i]))).toEqual(printed.mean);
  });

  it('reads the same to the last printed digit of every standard error', () => {
    const covariance = symmetric(fit.covarianceLower, columns);
    const standardError = covariance.map((row, i) => Math.sqrt(row[i]));
    const shown = standardError.map((value, i) => asPrinted(value, printed.standardError[i]));
    expect(shown).toEqual(printed.standardError);
  });

  it('reads the same to the last printed digit of the residual deviance', () => {
    expect(asPrinted(deviance(data, fit.mean), printed.deviance)).toBe(printed.deviance);
  });
});
