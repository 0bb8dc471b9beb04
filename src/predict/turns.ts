import type { UnvalidatedModel } from '../model/fit.ts';
import type { Unity } from '../chemistry/unity.ts';
import { coneText } from '../firing/cone.ts';
import { columnValues, scaledInputs } from '../model/inputs.ts';
import { stageLogOdds, surfaceProbability } from '../model/log-odds.ts';
import type { Surface } from '../model/model.ts';
import { log1pExp } from '../numeric/logistic.ts';
import { findRoot } from '../numeric/roots.ts';
import type { Turn } from './answers.ts';
import { evenNodes, nearestPlace, placePosterior, type Place } from './place.ts';
import { lineRows, logOddsAlong, type StageDraws } from './posterior-draws.ts';
import { mostProbable } from './predict.ts';

/** Distance of the nodes at which surfaces are compared, in cones; places are interpolated. */
const CELL_CONES = 0.05;
/** Accuracy of the place of a turn, in cones. */
const PLACE_TOLERANCE = 1e-6;

/** A change of the most probable surface. */
interface Change {
  readonly from: Surface;
  readonly to: Surface;
  readonly at: number;
}

/**
 * The cones at which the most probable surface of a glaze changes.
 *
 * The place comes from the posterior mean probabilities. Its interval is taken over draws of the
 * posterior: in each, the nearest change from the same surface to the same surface. A draw that keeps
 * the old surface from the place to the end of the range counts as turning beyond it, one that has had
 * the new one all the way up to the place as turning below it; one that goes over the third surface
 * has no such turn.
 *
 * @param model - fitted model
 * @param draws - posterior draws of both stages
 * @param unity - composition
 * @param range - cones between which to look
 * @returns the turns, from cool to hot
 */
export function turns(
  model: UnvalidatedModel,
  draws: { readonly melt: StageDraws; readonly gloss: StageDraws },
  unity: Unity,
  range: readonly [number, number],
): Turn[] {
  const nodes = evenNodes(range, Math.max(1, Math.round((range[1] - range[0]) / CELL_CONES)));
  const found = meanChanges(model, unity, nodes);
  if (found.length === 0) return [];
  const paths = drawPaths(draws, unity, nodes);
  return found.map(({ from, to, at }) => ({
    from,
    to,
    coneIndex: at,
    cone: coneText(at),
    ...placePosterior(paths.map((path) => turnPlace(path, nodes, { from, to, at }))),
  }));
}

function meanChanges(model: UnvalidatedModel, unity: Unity, nodes: readonly number[]): Change[] {
  const probability = (cone: number) =>
    surfaceProbability(
      stageLogOdds(model.melt, unity, cone),
      stageLogOdds(model.gloss, unity, cone),
    );
  const path = nodes.map((cone) => mostProbable(probability(cone)));
  return changesOf(path).map(({ from, to, cell }) => {
    const contest = (cone: number) => {
      const p = probability(cone);
      return p[to] - p[from];
    };
    return { from, to, at: findRoot(contest, nodes[cell]!, nodes[cell + 1]!, PLACE_TOLERANCE) };
  });
}

/** Surfaces along the nodes in one draw, and by how much the winner of each node leads. */
interface DrawPath {
  readonly surfaces: readonly Surface[];
  readonly melt: Float64Array;
  readonly gloss: Float64Array;
}

function drawPaths(
  draws: { readonly melt: StageDraws; readonly gloss: StageDraws },
  unity: Unity,
  nodes: readonly number[],
): DrawPath[] {
  const rowsOf = ({ columns }: StageDraws) =>
    lineRows(nodes.map((cone) => columnValues(scaledInputs(unity, cone), columns)));
  const meltRows = rowsOf(draws.melt);
  const glossRows = rowsOf(draws.gloss);
  return Array.from({ length: draws.melt.count }, (_, draw) => {
    const melt = logOddsAlong(draws.melt, draw, meltRows);
    const gloss = logOddsAlong(draws.gloss, draw, glossRows);
    const surfaces = nodes.map((_, i) => likeliest(melt[i]!, gloss[i]!));
    return { surfaces, melt, gloss };
  });
}

/** The surface with the highest probability, from the log-odds of both stages. */
function likeliest(melt: number, gloss: number): Surface {
  const melted = gloss > 0 ? 'gloss' : 'matte';
  return contest(melt, gloss, 'underfired', melted) > 0 ? melted : 'underfired';
}

/** ln P(to) - ln P(from). */
function contest(melt: number, gloss: number, from: Surface, to: Surface): number {
  return logProbability(melt, gloss, to) - logProbability(melt, gloss, from);
}

/** Logarithm of a surface's probability; what both sides of a contest share is left out. */
function logProbability(melt: number, gloss: number, surface: Surface): number {
  if (surface === 'underfired') return -melt;
  return -log1pExp(surface === 'gloss' ? -gloss : gloss);
}

function turnPlace(path: DrawPath, nodes: readonly number[], turn: Change): Place {
  const same = changesOf(path.surfaces).filter(
    ({ from, to }) => from === turn.from && to === turn.to,
  );
  if (same.length > 0)
    return nearestPlace(
      same.map((change) => crossing(path, nodes, change)),
      turn.at,
    );
  const there = nodes.indexOf(nearestPlace(nodes, turn.at));
  if (path.surfaces.slice(there).every((surface) => surface === turn.from)) return 'beyond';
  const before = path.surfaces.slice(0, there + 1);
  return before.every((surface) => surface === turn.to) ? 'below' : 'none';
}

function crossing(
  path: DrawPath,
  nodes: readonly number[],
  { from, to, cell }: CellChange,
): number {
  const lead = (i: number) => contest(path.melt[i]!, path.gloss[i]!, from, to);
  const [before, after] = [lead(cell), lead(cell + 1)];
  const share = before < 0 && after > 0 ? before / (before - after) : 0.5;
  return nodes[cell]! + share * (nodes[cell + 1]! - nodes[cell]!);
}

interface CellChange {
  readonly from: Surface;
  readonly to: Surface;
  /** The change lies between this node and the next. */
  readonly cell: number;
}

function changesOf(path: readonly Surface[]): CellChange[] {
  return path.slice(1).flatMap((to, cell) => {
    const from = path[cell]!;
    return from === to ? [] : [{ from, to, cell }];
  });
}
