import type { Archive } from '../../../src/archive/archive.ts';
import type { Surface, SurfaceProbability } from '../../../src/model/model.ts';
import { mean } from '../../../src/numeric/summary.ts';
import { ASKED_CONES, SURFACES, type Interval90, type PointAnswer } from './learner.ts';

/** How many cells were looked at and how many of them the interval held. */
export interface Held {
  readonly cells: number;
  readonly held: number;
}

/** How one learner did on one studio. */
export interface Measured {
  /** Mean Kullback-Leibler divergence from the truth to the answer, nats. */
  readonly excess: number;
  readonly excessAt: readonly number[];
  /** Over surfaces whose true probability is from 0.02 to 0.98; null without intervals. */
  readonly held: Held | null;
  /** By asked cone, by surface, and at cones within half a cone of which the archive has no tile. */
  readonly heldAt: readonly Held[];
  readonly heldOf: readonly Held[];
  readonly heldUnseen: Held;
  /** Mean over the same cells; null without intervals. */
  readonly intervalScore: number | null;
}

/** Least probability that an answer counts with: an answer of 0 would make the excess infinite. */
const LEAST_PROBABILITY = 1e-9;
/** True probabilities that count for coverage. */
const COUNTED = { from: 0.02, to: 0.98 };
/** Share of truths that a 90 % interval may miss. */
const MISSED = 0.1;

interface Cell {
  readonly cone: number;
  readonly surface: Surface;
  readonly truth: number;
  readonly interval: Interval90;
}

/**
 * Measures answers against the truth.
 *
 * @param truths - true probabilities, in the order of the points, then of `ASKED_CONES`
 * @param answers - in the same order
 * @param archive - what was learnt from
 * @returns excess, coverage, interval score
 */
export function measured(
  truths: readonly SurfaceProbability[],
  answers: readonly PointAnswer[],
  archive: Archive,
): Measured {
  const excess = answers.map(({ probability }, i) => divergence(truths[i], probability));
  const cells = answers.flatMap((answer, i) => cellsOf(truths[i], answer, coneAt(i)));
  const unseen = ASKED_CONES.filter((cone) => !hasTileAt(archive, cone));
  const heldWhere = (of: (cell: Cell) => boolean) => heldOf(cells.filter(of));
  return {
    excess: mean(excess),
    excessAt: ASKED_CONES.map((cone) => mean(excess.filter((_, i) => coneAt(i) === cone))),
    held: cells.length === 0 ? null : heldOf(cells),
    heldAt: ASKED_CONES.map((cone) => heldWhere((cell) => cell.cone === cone)),
    heldOf: SURFACES.map((surface) => heldWhere((cell) => cell.surface === surface)),
    heldUnseen: heldWhere(({ cone }) => unseen.includes(cone)),
    intervalScore: cells.length === 0 ? null : mean(cells.map(intervalScore)),
  };
}

const coneAt = (answer: number) => ASKED_CONES[answer % ASKED_CONES.length];

/** Whether a judged tile was fired within half a cone of it. */
function hasTileAt({ tiles }: Archive, cone: number): boolean {
  return tiles.some(({ heat }) => heat !== undefined && Math.abs(heat.coneIndex - cone) <= 0.5);
}

/**
 * Kullback-Leibler divergence from the truth to an answer.
 *
 * @param truth - true probabilities
 * @param answer - stated ones
 * @returns nats, 0 where they agree
 */
export function divergence(truth: SurfaceProbability, answer: SurfaceProbability): number {
  return SURFACES.reduce((sum, surface) => {
    const trulyHere = truth[surface];
    if (!(trulyHere > 0)) return sum;
    return sum + trulyHere * Math.log(trulyHere / Math.max(LEAST_PROBABILITY, answer[surface]));
  }, 0);
}

function cellsOf(truth: SurfaceProbability, { interval90 }: PointAnswer, cone: number): Cell[] {
  if (interval90 === undefined) return [];
  return SURFACES.filter((s) => truth[s] >= COUNTED.from && truth[s] <= COUNTED.to).map(
    (surface) => ({ cone, surface, truth: truth[surface], interval: interval90[surface] }),
  );
}

function heldOf(cells: readonly Cell[]): Held {
  const held = cells.filter(({ truth, interval: [low, high] }) => truth >= low && truth <= high);
  return { cells: cells.length, held: held.length };
}

/**
 * Width of an interval, and 2 / 0.1 times what lies outside it: the smaller the better.
 *
 * Source: T. Gneiting and A. E. Raftery, J. Am. Stat. Assoc. 102 (2007) 359-378, eq. 43.
 */
function intervalScore({ truth, interval: [low, high] }: Cell): number {
  return high - low + (2 / MISSED) * (Math.max(0, low - truth) + Math.max(0, truth - high));
}
