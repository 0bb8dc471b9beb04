/**
 * The fitted answer against the demo studio's invented truth, over redraws of the studio.
 *
 * Excess: mean Kullback-Leibler divergence, in nats, from the true probabilities to the predicted
 * ones. Coverage: how often the 90 % interval holds the true probability, among those from 0.02 to
 * 0.98. Both over a grid of points at cones 5, 6 and 7.
 */
import { drawStudio, trueProbability } from '../../datasets/demo-studio/truth.ts';
import { parseArchive } from '../../src/archive/read-archive.ts';
import type { Unity } from '../../src/chemistry/unity.ts';
import { fitUnvalidated } from '../../src/model/fit.ts';
import { SURFACES, type Surface, type SurfaceProbability } from '../../src/model/model.ts';
import { mean, sampleSd } from '../../src/numeric/summary.ts';
import { predict } from '../../src/predict/predict.ts';

/** What one redraw shows. */
export interface Redraw {
  readonly seed: number;
  readonly tiles: number;
  readonly excess: number;
  /** Of always answering with the shares among the tiles. */
  readonly baseRateExcess: number;
  readonly coverage: number;
  readonly coverageOf: Readonly<Record<Surface, number>>;
  readonly coverageAt: Readonly<Record<number, number>>;
}

const CONES = [5, 6, 7];
const GRID: readonly Unity[] = [2, 2.5, 3, 3.5, 4, 4.5, 5].flatMap((SiO2) =>
  [0.25, 0.35, 0.45, 0.55, 0.65].flatMap((Al2O3) =>
    [0.05, 0.17, 0.3].flatMap((B2O3) =>
      [0.25, 0.35].map((KNaO) => ({
        SiO2,
        Al2O3,
        B2O3,
        Na2O: KNaO / 2,
        K2O: KNaO / 2,
        CaO: 1 - KNaO,
      })),
    ),
  ),
);

/**
 * Draws the studio anew, fits it and compares with the truth.
 *
 * @param seed - seed of the redraw
 * @returns excess and coverage
 */
export function redraw(seed: number): Redraw {
  const encoder = new TextEncoder();
  const files = [...drawStudio(seed)].map(([name, text]) => [name, encoder.encode(text)] as const);
  const archive = parseArchive(new Map(files));
  const model = fitUnvalidated(archive);
  const points = GRID.map((unity, i) => ({ point: String(i), unity }));
  const rows = predict(model, points, CONES).predictions.map((prediction) => ({
    prediction,
    truth: trueProbability(GRID[Number(prediction.point)], prediction.coneIndex),
  }));
  const verdicts = archive.tiles.map(({ verdict }) => verdict);
  const baseRate = ratesOf(
    verdicts.filter((v) => v === 'underfired' || v === 'matte' || v === 'gloss'),
  );
  const cells = rows.flatMap(({ prediction, truth }) =>
    SURFACES.filter((surface) => truth[surface] >= 0.02 && truth[surface] <= 0.98).map(
      (surface) => ({
        surface,
        cone: prediction.coneIndex,
        held:
          truth[surface] >= prediction.interval90[surface][0] &&
          truth[surface] <= prediction.interval90[surface][1],
      }),
    ),
  );
  const share = (own: typeof cells) => own.filter(({ held }) => held).length / own.length;
  return {
    seed,
    tiles: archive.counts.fitted,
    excess: mean(rows.map(({ prediction, truth }) => divergence(truth, prediction.probability))),
    baseRateExcess: mean(rows.map(({ truth }) => divergence(truth, baseRate))),
    coverage: share(cells),
    coverageOf: record(SURFACES, (surface) => share(cells.filter((c) => c.surface === surface))),
    coverageAt: record(CONES, (cone) => share(cells.filter((c) => c.cone === cone))),
  };
}

/**
 * Redraws in words: a row each, then means with their standard errors.
 *
 * @param redraws - at least two
 * @returns lines of text
 */
export function redrawTable(redraws: readonly Redraw[]): string[] {
  const percent = (share: number) => `${(100 * share).toFixed(1)} %`.padStart(8);
  const row = (head: string, r: Omit<Redraw, 'seed' | 'tiles'>) =>
    [
      head.padEnd(14),
      r.excess.toFixed(4).padStart(8),
      r.baseRateExcess.toFixed(3).padStart(8),
      percent(r.coverage),
      ...SURFACES.map((surface) => percent(r.coverageOf[surface])),
      ...CONES.map((cone) => percent(r.coverageAt[cone])),
    ].join(' ');
  const over = (statistic: (values: number[]) => number) => ({
    excess: statistic(redraws.map((r) => r.excess)),
    baseRateExcess: statistic(redraws.map((r) => r.baseRateExcess)),
    coverage: statistic(redraws.map((r) => r.coverage)),
    coverageOf: record(SURFACES, (s) => statistic(redraws.map((r) => r.coverageOf[s]))),
    coverageAt: record(CONES, (c) => statistic(redraws.map((r) => r.coverageAt[c]))),
  });
  const head = [
    '',
    'excess',
    'of rates',
    'held',
    'underf.',
    'matte',
    'gloss',
    'cone 5',
    'cone 6',
    'cone 7',
  ];
  return [
    head.map((word, i) => (i === 0 ? word.padEnd(14) : word.padStart(8))).join(' '),
    ...redraws.map((r) => row(`${r.seed} (${r.tiles} tiles)`, r)),
    row('mean', over(mean)),
    row(
      'std. error',
      over((values) => sampleSd(values) / Math.sqrt(values.length)),
    ),
  ];
}

function divergence(truth: SurfaceProbability, predicted: SurfaceProbability): number {
  return SURFACES.reduce(
    (sum, s) => (truth[s] > 0 ? sum + truth[s] * Math.log(truth[s] / predicted[s]) : sum),
    0,
  );
}

function ratesOf(verdicts: readonly Surface[]): SurfaceProbability {
  return record(SURFACES, (s) => verdicts.filter((v) => v === s).length / verdicts.length);
}

function record<K extends string | number, V>(
  keys: readonly K[],
  value: (key: K) => V,
): Record<K, V> {
  return Object.fromEntries(keys.map((key) => [key, value(key)])) as Record<K, V>;
}
