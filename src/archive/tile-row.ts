import { OXIDES } from '../chemistry/oxides.ts';
import type { Unity } from '../chemistry/unity.ts';
import type { Fault } from '../errors.ts';
import type { Firing, Heat, Recipe, Tile, WitnessReading } from './archive.ts';
import { glazeProblem, unityOfCells, type UnityRead } from './composition-cells.ts';
import { quoted } from './found-text.ts';
import { ownPeakC } from './own-peak.ts';
import { lookUp, type Register } from './register.ts';
import type { SheetRow } from './sheet.ts';
import type { TileValues } from './tile-columns.ts';
import { tileHeat } from './tile-heat.ts';
import { verdictOf } from './tile-verdict.ts';
import { withoutBlanks } from './without-blanks.ts';

/** What the rest of the archive says, and what tiles.csv itself has. */
export interface TileContext {
  readonly file: string;
  readonly has: (column: string) => boolean;
  /** False where the headings are faulty: a missing value may then stand in a column not known. */
  readonly isWhole: boolean;
  /** Undefined where there is no such file. */
  readonly recipes: Register<Recipe> | undefined;
  readonly firings: Register<Firing> | undefined;
  readonly witness: Register<WitnessReading> | undefined;
  /** The load of a tile that names no firing. */
  readonly loadAlone: (tile: string) => string;
}

export interface TileRead {
  /** Undefined where there are faults. */
  readonly tile: Tile | undefined;
  readonly faults: readonly Fault[];
}

type CellFault = Pick<Fault, 'column' | 'message'>;

/**
 * One tile from its row and what the row refers to.
 *
 * @param row - the row, read cell by cell
 * @param context - the rest of the archive
 * @returns the tile if it is sound, and every fault if it is not
 */
export function tileOfRow(row: SheetRow<TileValues>, context: TileContext): TileRead {
  const { values, line } = row;
  const unread = new Set(row.faults.map(({ column }) => column));
  const composition = compositionOf(values, unread, context);
  const firing = firingOf(values, context);
  const verdict = verdictOf(values.surface, values.drip);
  const maySkipHeat = verdict === 'unjudged' || !context.isWhole;
  const isHeatKnowable = !unread.has('cone') && !unread.has('firing') && firing.faults.length === 0;
  const heat = isHeatKnowable
    ? heatOf(row, firing.firing, context, maySkipHeat)
    : { heat: undefined, faults: [] };
  const cellFaults = [
    ...('faults' in composition ? composition.faults : []),
    ...firing.faults,
    ...heat.faults,
  ];
  const place = { file: context.file, line };
  const faults = [...row.faults, ...cellFaults.map((fault) => ({ ...place, ...fault }))];
  const isSound = faults.length === 0 && context.isWhole && values.tile !== undefined;
  if (!isSound || 'faults' in composition) return { tile: undefined, faults };
  const load = values.firing ?? context.loadAlone(values.tile);
  const { unity } = composition;
  const judged = { unity, heat: heat.heat, load, verdict };
  return { tile: soundTile(values.tile, row, judged), faults };
}

interface Judged {
  readonly unity: Unity;
  readonly heat: Heat | undefined;
  readonly load: string;
  readonly verdict: Tile['verdict'];
}

function soundTile(tile: string, row: SheetRow<TileValues>, judged: Judged): Tile {
  const { line, values, other } = row;
  return withoutBlanks({
    tile,
    line,
    unity: judged.unity,
    recipe: values.recipe,
    blend: values.blend,
    firing: values.firing,
    heat: judged.heat,
    load: judged.load,
    surfaceWritten: values.surface ?? '',
    verdict: judged.verdict,
    drip: values.drip,
    crazing: values.crazing,
    shivering: values.shivering,
    body: values.body,
    shelf: values.shelf,
    thicknessMm: values.thickness_mm,
    glossUnits: values.gloss_units,
    judgedBy: values.judged_by,
    note: values.note,
    other,
  });
}

function compositionOf(
  values: TileValues,
  unread: ReadonlySet<string>,
  { has, isWhole, recipes }: TileContext,
): UnityRead {
  const isUnread = (column: string) => unread.has(column);
  const recipeFault = (message: string) => ({ faults: [{ column: 'recipe', message }] });
  const givesOxides = OXIDES.some((oxide) => values[oxide] !== undefined || isUnread(oxide));
  if (isUnread('recipe')) return { faults: [] };
  if (values.recipe !== undefined) {
    if (givesOxides) return recipeFault('expected a recipe or oxides in moles, got both');
    return recipeComposition(values.recipe, recipes);
  }
  const hasOxides = OXIDES.some(has);
  if (!givesOxides && has('recipe')) {
    const expected = hasOxides
      ? 'a recipe or oxides in moles, got neither'
      : 'a recipe, got a blank cell';
    return isWhole ? recipeFault(`expected ${expected}`) : { faults: [] };
  }
  const read = unityOfCells(values, isUnread, has);
  // A flux may stand in a column whose heading is misspelt.
  const mayBeElsewhere = 'faults' in read && !isWhole;
  return mayBeElsewhere ? { faults: read.faults.filter(({ column }) => has(column)) } : read;
}

function recipeComposition(name: string, recipes: Register<Recipe> | undefined): UnityRead {
  const fault = (message: string) => ({ faults: [{ column: 'recipe', message }] });
  if (recipes === undefined) {
    return fault(`expected a recipes.csv to look up the recipe, got ${quoted(name)}`);
  }
  const found = lookUp(recipes, name);
  if ('problem' in found) return fault(found.problem);
  const problem = glazeProblem(found.value.unity);
  if (problem !== undefined) return fault(`${problem.message} (${problem.column} of the recipe)`);
  return { unity: found.value.unity };
}

function firingOf({ firing: name }: TileValues, { firings }: TileContext) {
  const noFaults: CellFault[] = [];
  if (name === undefined || firings === undefined) return { firing: undefined, faults: noFaults };
  const found = lookUp(firings, name);
  if ('value' in found) return { firing: found.value, faults: noFaults };
  return { firing: undefined, faults: [{ column: 'firing', message: found.problem }] };
}

function heatOf(
  { values, other }: SheetRow<TileValues>,
  firing: Firing | undefined,
  { witness }: TileContext,
  maySkip: boolean,
): { heat: Heat | undefined; faults: CellFault[] } {
  const read = tileHeat({ ...values, peakC: ownPeakC(other) }, firing, witness);
  if ('heat' in read) return { heat: read.heat, faults: [] };
  if (read.isMissing && maySkip) return { heat: undefined, faults: [] };
  return { heat: undefined, faults: [{ column: read.column, message: read.problem }] };
}
