import type { UnvalidatedModel } from '../model/fit.ts';
import { hazardNotes } from '../chemistry/hazards.ts';
import { coneText } from '../firing/cone.ts';
import { stageLogOdds } from '../model/log-odds.ts';
import { isJudged, type StageName } from '../model/stages.ts';
import { findRoot } from '../numeric/roots.ts';
import type { Boundaries, Boundary, Point } from './answers.ts';
import {
  EDGE_STEPS,
  experienceOf,
  placeInSteps,
  squaredSteps,
  surroundings,
  type Experience,
} from './experience.ts';
import { compositionLines, type CompositionLine } from './lines.ts';
import { middleComposition } from './middle.ts';
import {
  evenNodes,
  gridZeros,
  nearestNode,
  nearestPlace,
  placePosterior,
  type Direction,
  type GridZero,
  type Place,
} from './place.ts';
import { normalTable, pathDraws, type NormalTable, type PathDraws } from './path-draws.ts';
import { modelStamp } from './predict.ts';

export interface BoundariesOptions {
  /** Composition through which the lines run; the middle of the archive where absent. */
  readonly through?: Point;
}

/** Cells of a line; crossings of draws are interpolated between nodes. */
const CELLS = 120;
/** The move per cone is taken between half a cone below and half a cone above. */
const HALF_CONE = 0.5;
/** Tiles count as near a boundary up to this far in heat. */
const NEAR_CONES = 0.5;

/** Draws of both stages over a line at three heats, end to end. */
type LineDraws = Readonly<Record<StageName, PathDraws>>;
/** The heats, from the cone asked about. */
const HEATS = [-HALF_CONE, 0, HALF_CONE] as const;

/**
 * Where the melt and the gloss boundary cross three lines through a composition, at each cone.
 *
 * The melt boundary is where P(melted) = 1/2, the gloss boundary where P(gloss given melted) = 1/2 and
 * P(melted) is at least 1/2. Intervals are taken over the posterior of the place.
 *
 * @param model - fitted model
 * @param coneIndexes - cones as numbers
 * @param options - composition through which the lines run
 * @returns all crossings; one row without a value for a line that does not meet a boundary
 */
export function boundaries(
  model: UnvalidatedModel,
  coneIndexes: readonly number[],
  { through }: BoundariesOptions = {},
): Boundaries {
  const tiles = model.archive.tiles.filter(isJudged);
  const middle = through ?? middleComposition(tiles);
  const lines = compositionLines(middle.unity, tiles);
  const tables = { melt: normalTable('melt'), gloss: normalTable('gloss') };
  const experience = experienceOf(tiles);
  return {
    schema: 'coneshift.boundaries/1',
    model: modelStamp(model),
    through: middle.unity,
    throughSource: through ? `asked: ${through.point}` : middle.point,
    boundaries: coneIndexes.flatMap((coneIndex) =>
      lines.flatMap((line) => {
        const draws = lineDraws(model, tables, line, coneIndex);
        return lineBoundaries({ model, draws, experience, line, coneIndex });
      }),
    ),
    notes: hazardNotes(middle.unity),
  };
}

interface Question {
  readonly model: UnvalidatedModel;
  readonly draws: LineDraws;
  readonly experience: Experience;
  readonly line: CompositionLine;
  readonly coneIndex: number;
}

function lineDraws(
  model: UnvalidatedModel,
  tables: Readonly<Record<StageName, NormalTable>>,
  line: CompositionLine,
  coneIndex: number,
): LineDraws {
  const nodes = evenNodes(line.range, CELLS).map((place) => line.unityAt(place));
  const path = HEATS.flatMap((off) =>
    nodes.map((unity) => ({ unity, coneIndex: coneIndex + off })),
  );
  return {
    melt: pathDraws(model.melt, path, tables.melt),
    gloss: pathDraws(model.gloss, path, tables.gloss),
  };
}

function lineBoundaries(question: Question): Boundary[] {
  return (['melt', 'gloss'] as const).flatMap((kind) => {
    const places = meanCrossings(question, kind, question.coneIndex);
    return (places.length === 0 ? [overallTrend(question, kind)] : places).map((crossing) =>
      boundaryRow(question, kind, crossing),
    );
  });
}

/** A crossing of the posterior mean; without a place, which way the line goes over all. */
interface Crossing {
  readonly place: number | null;
  readonly direction: Direction;
}

function boundaryRow(question: Question, kind: StageName, crossing: Crossing): Boundary {
  const { line, coneIndex } = question;
  const { place: value } = crossing;
  const drawn = drawnPlaces(question, kind, crossing);
  const there = drawn.map(([, place]) => place);
  const moves = drawn.map((places) => movePerCone(...places));
  const [below, above] = sides(question, kind, crossing);
  return {
    cone: coneText(coneIndex),
    coneIndex,
    kind,
    along: line.along,
    at: line.at,
    value,
    ...placePosterior(there),
    lookedAt: line.range,
    ...placeSupport(question, kind, value),
    perCone: value === null ? null : meanMove(question, kind, crossing),
    perConeInterval90: placePosterior(moves).interval90,
    below,
    above,
  };
}

/** Mean log-odds of a stage along the line: its sign is the side of 1/2 the mean probability is on. */
function meanLogOdds({ model, line }: Question, kind: StageName, coneIndex: number) {
  return (place: number) => stageLogOdds(model[kind], line.unityAt(place), coneIndex).mean;
}

function meanCrossings(question: Question, kind: StageName, coneIndex: number) {
  const nodes = evenNodes(question.line.range, CELLS);
  const logOdds = meanLogOdds(question, kind, coneIndex);
  const melted = meanLogOdds(question, 'melt', coneIndex);
  return gridZeros(nodes.map(logOdds), nodes)
    .map(({ cell, direction }) => {
      const [low, high] = [nodes[cell]!, nodes[cell + 1]!];
      return { place: findRoot(logOdds, low, high, (high - low) * 1e-9), direction };
    })
    .filter(({ place }) => kind === 'melt' || melted(place) >= 0);
}

function overallTrend(question: Question, kind: StageName): Crossing {
  const [low, high] = question.line.range.map(meanLogOdds(question, kind, question.coneIndex));
  return { place: null, direction: high! > low! ? 'rising' : 'falling' };
}

/** The place at each heat in each draw of the posterior. */
function drawnPlaces(
  { draws, line }: Question,
  kind: StageName,
  crossing: Crossing,
): (readonly [Place, Place, Place])[] {
  const nodes = evenNodes(line.range, CELLS);
  return Array.from({ length: draws[kind].count }, (_, draw) => {
    const own = draws[kind].logOdds(draw);
    const melt = kind === 'melt' ? own : draws.melt.logOdds(draw);
    const at = (heat: number) => {
      const part = [heat * nodes.length, (heat + 1) * nodes.length] as const;
      return drawnPlace(nodes, own.subarray(...part), melt.subarray(...part), kind, crossing);
    };
    return [at(0), at(1), at(2)] as const;
  });
}

/** Of the crossings in the same direction, the nearest. */
function drawnPlace(
  nodes: readonly number[],
  logOdds: Float64Array,
  melt: Float64Array,
  kind: StageName,
  crossing: Crossing,
): Place {
  const zeros = gridZeros(logOdds, nodes).filter(
    ({ direction }) => direction === crossing.direction,
  );
  const isMelted = ({ cell }: GridZero) => kind === 'melt' || melt[cell]! >= 0;
  const shown = zeros.filter(isMelted).map(({ place }) => place);
  if (shown.length > 0) return nearestPlace(shown, crossing.place ?? shown[0]!);
  // It crosses, but only where the glaze is not melted.
  if (zeros.length > 0) return 'none';
  const from = crossing.place === null ? 0 : nearestNode(nodes, crossing.place);
  const isAbove = logOdds[from]! >= 0 === (crossing.direction === 'rising');
  return isAbove ? 'below' : 'beyond';
}

/** Place half a cone hotter less half a cone cooler; twice the half where one of them is missing. */
function movePerCone(cooler: Place, there: Place, hotter: Place): Place {
  const known = (place: Place) => typeof place === 'number';
  if (known(hotter) && known(cooler)) return hotter - cooler;
  if (known(hotter) && known(there)) return (hotter - there) / HALF_CONE;
  return known(there) && known(cooler) ? (there - cooler) / HALF_CONE : 'none';
}

function meanMove(question: Question, kind: StageName, crossing: Crossing): number | null {
  const near = (off: number): Place => {
    const places = meanCrossings(question, kind, question.coneIndex + off)
      .filter(({ direction }) => direction === crossing.direction)
      .map(({ place }) => place);
    return places.length === 0 ? 'none' : nearestPlace(places, crossing.place!);
  };
  const move = movePerCone(near(-HALF_CONE), crossing.place!, near(HALF_CONE));
  return typeof move === 'number' ? move : null;
}

const SIDE_NAMES = { melt: ['underfired', 'melted'], gloss: ['matte', 'gloss'] } as const;

/** What lies below and above the place; without one, what all of the line is. */
function sides(question: Question, kind: StageName, crossing: Crossing): [string, string] {
  const [no, yes] = SIDE_NAMES[kind];
  if (crossing.place !== null) return crossing.direction === 'rising' ? [no, yes] : [yes, no];
  const { line, coneIndex } = question;
  const melted = meanLogOdds(question, 'melt', coneIndex);
  const nodes = evenNodes(line.range, CELLS);
  // Gloss or matte is asked only where the glaze melts.
  const asked = kind === 'melt' ? nodes : nodes.filter((place) => melted(place) >= 0);
  const middle = asked[Math.floor(asked.length / 2)];
  if (middle === undefined) return ['underfired', 'underfired'];
  const all = meanLogOdds(question, kind, coneIndex)(middle) >= 0 ? yes : no;
  return [all, all];
}

/** The tiles about a place, and how far inside the archive it lies. */
function placeSupport(
  { experience, coneIndex, line }: Question,
  kind: StageName,
  value: number | null,
) {
  if (value === null) return { tilesNear: 0, support: null, nearest: [] };
  const unity = line.unityAt(value);
  const squares = squaredSteps(experience, unity);
  const isNear = (heat: number, i: number) =>
    squares[i]! <= EDGE_STEPS ** 2 && Math.abs(heat - coneIndex) <= NEAR_CONES;
  // An underfired tile says nothing of gloss.
  const speaks = (verdict: string) => kind === 'melt' || verdict === 'gloss' || verdict === 'matte';
  const tilesNear = experience.tiles.filter(
    ({ heat, verdict }, i) => speaks(verdict) && isNear(heat!.coneIndex, i),
  ).length;
  const { support, nearest } = surroundings(experience, placeInSteps(experience, unity), coneIndex);
  return { tilesNear, support, nearest };
}
