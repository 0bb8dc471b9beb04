import { coneText } from '../../src/firing/cone.ts';
import { chanceOf, type Chance } from './chance.ts';
import { BODIES, drawCrazing } from './crazing.ts';
import { csv, type Cell } from './csv.ts';
import { drawFirings, type DrawnFiring } from './firings.ts';
import { contents } from './plan.ts';
import { shelfFiles } from './shelf-files.ts';
import { drawTiles, type FiredTile, type TrueSurface } from './tiles.ts';
import { drawVerdicts, type Verdict } from './verdicts.ts';

/** What the archive does not say. */
export interface StudioTruth {
  /** Tiles whose verdict on paper is not what they are. */
  readonly wrongLabels: readonly {
    readonly tile: string;
    readonly trueSurface: TrueSurface;
    readonly written: string;
  }[];
  /** True heat of each load less the heat on paper, in cones. */
  readonly loadErrors: readonly { readonly firing: string; readonly errorCones: number }[];
  /** True heat and surface of every fired tile. */
  readonly tiles: readonly {
    readonly tile: string;
    readonly coneIndex: number;
    readonly surface: TrueSurface;
  }[];
}

/** An archive with its truth. */
export interface DrawnStudio {
  /** File name -> CSV text: the archive. */
  readonly files: ReadonlyMap<string, string>;
  readonly truth: StudioTruth;
  /** File name -> CSV text: the truth, to be kept apart from the archive. */
  readonly truthFiles: ReadonlyMap<string, string>;
}

/** One stream of chance for each purpose. */
const STREAM = { firings: 1, contents: 2, weighing: 3, surfaces: 4, verdicts: 5, pots: 6 } as const;
const JUDGES = ['Ilka', 'Bram', 'Wenna'] as const;
/** Tiles dipped and waiting for a kiln. */
const WAITING = ['Moth Grey', 'Quiet Lime', 'Pewterleaf'] as const;

/**
 * The invented studio's archive.
 *
 * @param seed - 1 gives the committed files; any other whole number another history of the same
 *   studio: the recipes stay, what happened in the kilns and at the scales does not
 * @returns file name -> CSV text
 */
export function drawStudio(seed: number): ReadonlyMap<string, string> {
  return drawStudioWithTruth(seed).files;
}

/**
 * The invented studio's archive, with what truly happened.
 *
 * @param seed - as for `drawStudio`
 * @returns the archive, its truth, and the truth as files
 */
export function drawStudioWithTruth(seed: number): DrawnStudio {
  const firings = drawFirings(chanceOf(seed, STREAM.firings));
  const recipes = contents(chanceOf(seed, STREAM.contents));
  const weighing = chanceOf(seed, STREAM.weighing);
  const tiles = drawTiles(firings, recipes, weighing, chanceOf(seed, STREAM.surfaces));
  const verdicts = drawVerdicts(tiles, chanceOf(seed, STREAM.verdicts));
  const pots = chanceOf(seed, STREAM.pots);
  const truth = truthOf(firings, tiles, verdicts);
  const files = new Map([
    ['tiles.csv', tilesFile(tiles, verdicts, pots)],
    ['firings.csv', firingsFile(firings)],
    ['witness.csv', witnessFile(firings)],
    ...shelfFiles(),
  ]);
  return { files, truth, truthFiles: truthFiles(truth) };
}

function tilesFile(
  tiles: readonly FiredTile[],
  verdicts: ReadonlyMap<string, Verdict>,
  chance: Chance,
): string {
  const header =
    'tile,recipe,blend,firing,shelf,surface,drip,crazing,body,thickness_mm,judged_by,note';
  const rows = tiles.map((tile) => tileRow(tile, verdicts.get(tile.tile)!, chance));
  const waiting = WAITING.map((recipe, place) => {
    const blanks = ['', '', '', '', '', ''];
    return [`W-0${place + 1}`, recipe, ...blanks, BODIES[0].body, '', '', 'waits for a kiln'];
  });
  return csv(header.split(','), [...rows, ...waiting]);
}

function tileRow(tile: FiredTile, verdict: Verdict, chance: Chance): readonly Cell[] {
  const { recipe, firing, shelf, unity, surface } = tile;
  const body = chance.uniform() < 0.6 ? BODIES[0] : BODIES[1];
  const net = drawCrazing(unity, body, chance);
  const isLookedAt = chance.uniform() < 0.75;
  const thicknessMm = Math.round(10 * (0.8 + 0.15 * chance.normal())) / 10;
  const isMeasured = chance.uniform() < 0.5;
  const judge = JUDGES[Math.floor(JUDGES.length * chance.uniform())];
  const isJudged = verdict.surface !== '';
  const hasNet = isJudged && isLookedAt && surface !== 'underfired' && !verdict.isWrong;
  return [
    ...[tile.tile, recipe.recipe, recipe.blend ?? '', firing.firing, shelf],
    ...[verdict.surface, verdict.drip, hasNet ? net : '', body.body],
    ...[isMeasured ? thicknessMm : '', isJudged ? judge : '', verdict.note],
  ];
}

function firingsFile(firings: readonly DrawnFiring[]): string {
  const header = 'firing,date,kiln,set_cone,cone,peak_c,hold_min,cooling_c_per_h,atmosphere';
  const rows = firings.map((f) => [
    ...[f.firing, f.date, f.kiln, coneText(f.setCone)],
    ...[f.cone === undefined ? '' : coneText(f.cone), f.peakC, f.holdMin, f.coolingCPerH],
    'oxidation',
  ]);
  return csv(header.split(','), rows);
}

function witnessFile(firings: readonly DrawnFiring[]): string {
  const rows = firings.flatMap(({ firing, shelves }) =>
    [...shelves].map(([shelf, cone]) => [firing, shelf, coneText(cone)]),
  );
  return csv(['firing', 'shelf', 'cone'], rows);
}

function truthOf(
  firings: readonly DrawnFiring[],
  tiles: readonly FiredTile[],
  verdicts: ReadonlyMap<string, Verdict>,
): StudioTruth {
  const wrong = tiles.filter(({ tile }) => verdicts.get(tile)!.isWrong);
  return {
    wrongLabels: wrong.map(({ tile, surface }) => {
      return { tile, trueSurface: surface, written: verdicts.get(tile)!.surface };
    }),
    loadErrors: firings.map((f) => ({ firing: f.firing, errorCones: f.loadErrorCones })),
    tiles: tiles.map(({ tile, coneIndex, surface }) => ({ tile, coneIndex, surface })),
  };
}

function truthFiles({ wrongLabels, loadErrors, tiles }: StudioTruth): ReadonlyMap<string, string> {
  const labels = wrongLabels.map((w) => [w.tile, w.trueSurface, w.written]);
  const errors = loadErrors.map((e) => [e.firing, e.errorCones.toFixed(3)]);
  const fired = tiles.map((t) => [t.tile, t.coneIndex.toFixed(2), t.surface]);
  return new Map([
    ['wrong-labels.csv', csv(['tile', 'true_surface', 'written'], labels)],
    ['load-errors.csv', csv(['firing', 'error_cones'], errors)],
    ['true-tiles.csv', csv(['tile', 'true_cone', 'true_surface'], fired)],
  ]);
}
