import { readFileSync } from 'node:fs';
import type { LogisticData, LogisticPosterior } from '../../../src/model/logistic.ts';
import { lowerIndex, quadraticForm } from '../../../src/numeric/linalg.ts';
import rDataSets from './r-data-sets.json' with { type: 'json' };

type Row = Readonly<Record<string, number>>;

/** Rows of one of the published data sets, by column name; every column of them is a number. */
function published(name: string): readonly Row[] {
  const url = new URL(`../../../datasets/published/stats-${name}.csv`, import.meta.url);
  const [header, ...lines] = readFileSync(url, 'utf8').trim().split(/\r?\n/);
  const columns = header.split(',');
  return lines.map((line) => {
    const cells = line.split(',').map(Number);
    return Object.fromEntries(columns.map((column, i) => [column, cells[i]]));
  });
}

function design(rows: readonly Row[], columns: (row: Row) => number[]): number[][] {
  return rows.map((row) => [1, ...columns(row)]);
}

const flights = published('challenger');
const reflexes = published('vasoconstriction');
const doses = published('bioassay');

const logDose = doses.map((row) => row['log_dose_log_g_per_ml']);
const meanLogDose = logDose.reduce((sum, dose) => sum + dose, 0) / logDose.length;
const sdLogDose = Math.sqrt(
  logDose.reduce((sum, dose) => sum + (dose - meanLogDose) ** 2, 0) / (logDose.length - 1),
);
const deaths = {
  outcome: doses.map((row) => row['deaths'] / row['animals']),
  weight: doses.map((row) => row['animals']),
};

const LEAK_TEST_PSI = [50, 100, 200];

/** The data of the checks, as gaussian-prior.R builds them too. */
export const DATA_SETS = {
  'o-rings, degrees F': {
    rows: design(flights, (row) => [row['temperature_F']]),
    outcome: flights.map((row) => row['any_distress']),
  },
  'o-rings of six, degrees F': {
    rows: design(flights, (row) => [row['temperature_F']]),
    outcome: flights.map((row) => row['distressed_orings'] / row['orings']),
    weight: flights.map((row) => row['orings']),
  },
  'o-rings': {
    rows: design(flights, (row) => [(row['temperature_F'] - 70) / 10]),
    outcome: flights.map((row) => row['any_distress']),
    load: flights.map((row) => LEAK_TEST_PSI.indexOf(row['leak_test_pressure_psi'])),
  },
  vasoconstriction: {
    rows: design(reflexes, (row) => [Math.log(row['volume_l']), Math.log(row['rate_l_per_s'])]),
    outcome: reflexes.map((row) => row['y']),
  },
  bioassay: { rows: logDose.map((dose) => [1, dose]), ...deaths },
  'bioassay, rescaled': {
    rows: logDose.map((dose) => [1, (0.5 * (dose - meanLogDose)) / sdLogDose]),
    ...deaths,
  },
  infert: rDataSets.infert.data,
  admissions: rDataSets.admissions.data,
} satisfies Readonly<Record<string, LogisticData>>;

/** The data set of that name, its loads left out unless asked for. */
export function dataSet(name: string, withLoads = false): LogisticData {
  const data: LogisticData | undefined = Object.entries(DATA_SETS).find(
    ([key]) => key === name,
  )?.[1];
  if (data === undefined) throw new RangeError(`no data set ${name}`);
  const { load, ...rest } = data;
  if (!withLoads) return rest;
  if (load === undefined) throw new RangeError(`data set ${name} has no loads`);
  return { ...rest, load };
}

/** Log-odds of every row at some weights, the loads left out. */
export function logOddsOf(rows: LogisticData['rows'], weights: readonly number[]): number[] {
  return rows.map((row) => row.reduce((sum, x, column) => sum + x * weights[column], 0));
}

/** The greatest absolute difference of two equally long lists. */
export function greatestDifference(a: readonly number[], b: readonly number[]): number {
  if (a.length !== b.length) throw new RangeError(`lengths ${a.length} and ${b.length}`);
  return a.reduce((worst, x, i) => {
    const difference = Math.abs(x - b[i]);
    // A NaN must win and stay: no comparison with it is true.
    return Number.isNaN(difference) || difference > worst ? difference : worst;
  }, 0);
}

/** A symmetric matrix from its lower triangle, row by row. */
export function symmetric(lower: readonly number[], size: number): number[][] {
  return Array.from({ length: size }, (_, i) =>
    Array.from({ length: size }, (__, j) => lower[lowerIndex(Math.max(i, j), Math.min(i, j))]),
  );
}

/** Variance of the log-odds at a row, the loads integrated out. */
export function logOddsVariance(posterior: LogisticPosterior, row: readonly number[]): number {
  return quadraticForm(posterior.covarianceLower, row);
}
