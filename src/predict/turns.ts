import type { UnvalidatedModel } from '../model/fit.ts';
import type { Unity } from '../chemistry/unity.ts';
import { coneText } from '../firing/cone.ts';
import { stageLogOdds, surfaceProbability } from '../model/log-odds.ts';
import { SURFACES, type Surface } from '../model/model.ts';
import { log1pExp } from '../numeric/logistic.ts';
import { findRoot } from '../numeric/roots.ts';
import type { Turn } from './answers.ts';
import { evenNodes, nearestNode, nearestPlace, placePosterior, type Place } from './place.ts';
import { pathDraws, type NormalTable } from './path-draws.ts';
import type { StageName } from '../model/stages.ts';
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
 * @param tables - normal numbers of both stages
 * @param unity - composition
 * @param range - cones between which to look
 * @returns the turns, from cool to hot
 */
export function turns(
  model: UnvalidatedModel,
  tables: Readonly<Record<StageName, NormalTable>>,
  unity: Unity,
  range: readonly [number, number],
): Turn[] {
  const nodes = evenNodes(range, Math.max(1, Math.round((range[1] - range[0]) / CELL_CONES)));
  const found = meanChanges(model, unity, nodes);
  if (found.length === 0) return [];
  const places = drawnPlaces(model, tables, unity, nodes, found);
  return found.map(({ from, to, at }, turn) => ({
    from,
    to,
    coneIndex: at,
    cone: coneText(at),
    ...placePosterior(places[turn]!),
  }));
}

function meanChanges(model: UnvalidatedModel, unity: Unity, nodes: readonly number[]): Change[] {
  const probability = (cone: number) =>
    surfaceProbability(
      stageLogOdds(model.melt, unity, cone),
      stageLogOdds(model.gloss, unity, cone),
    );
  const path = nodes.map((cone) => mostProbable(probability(cone)));
  return path.slice(1).flatMap((to, cell) => {
    const from = path[cell]!;
    if (from === to) return [];
    const contest = (cone: number) => {
      const p = probability(cone);
      return p[to] - p[from];
    };
    return [{ from, to, at: findRoot(contest, nodes[cell]!, nodes[cell + 1]!, PLACE_TOLERANCE) }];
  });
}

/** Place of each turn in each draw, [turns][draws]. */
function drawnPlaces(
  model: UnvalidatedModel,
  tables: Readonly<Record<StageName, NormalTable>>,
  unity: Unity,
  nodes: readonly number[],
  found: readonly Change[],
): Place[][] {
  const path = nodes.map((coneIndex) => ({ unity, coneIndex }));
  const melt = pathDraws(model.melt, path, tables.melt);
  const gloss = pathDraws(model.gloss, path, tables.gloss);
  const places: Place[][] = found.map(() => []);
  const codes = new Uint8Array(nodes.length);
  for (let draw = 0; draw < melt.count; draw++) {
    const drawn = { codes, melt: melt.logOdds(draw), gloss: gloss.logOdds(draw) };
    for (let i = 0; i < codes.length; i++) codes[i] = likeliest(drawn.melt[i]!, drawn.gloss[i]!);
    found.forEach((turn, t) => places[t]!.push(turnPlace(drawn, nodes, turn)));
  }
  return places;
}

/** One draw: log-odds along the nodes, and the likeliest surface there, as its place in SURFACES. */
interface DrawnPath {
  readonly codes: Uint8Array;
  readonly melt: Float64Array;
  readonly gloss: Float64Array;
}

/** The surface with the highest probability, from the log-odds of both stages. */
function likeliest(melt: number, gloss: number): number {
  // The likelier of matte and gloss has at least half of what melted.
  if (melt <= 0) return 0;
  if (melt < Math.LN2 && melt <= log1pExp(-Math.abs(gloss))) return 0;
  return gloss > 0 ? 2 : 1;
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

function turnPlace(path: DrawnPath, nodes: readonly number[], turn: Change): Place {
  const { codes } = path;
  const from = SURFACES.indexOf(turn.from);
  const to = SURFACES.indexOf(turn.to);
  const same: number[] = [];
  for (let cell = 0; cell + 1 < codes.length; cell++) {
    if (codes[cell] === from && codes[cell + 1] === to)
      same.push(crossing(path, nodes, turn, cell));
  }
  if (same.length > 0) return nearestPlace(same, turn.at);
  const there = nearestNode(nodes, turn.at);
  if (codes.subarray(there).every((code) => code === from)) return 'beyond';
  return codes.subarray(0, there + 1).every((code) => code === to) ? 'below' : 'none';
}

function crossing(
  path: DrawnPath,
  nodes: readonly number[],
  { from, to }: Change,
  cell: number,
): number {
  const lead = (i: number) => contest(path.melt[i]!, path.gloss[i]!, from, to);
  const [before, after] = [lead(cell), lead(cell + 1)];
  const share = before < 0 && after > 0 ? before / (before - after) : 0.5;
  return nodes[cell]! + share * (nodes[cell + 1]! - nodes[cell]!);
}
