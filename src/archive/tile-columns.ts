import { OXIDES } from '../chemistry/oxides.ts';
import type { Verdict } from './archive.ts';
import {
  coneCell,
  nameCell,
  numberCell,
  requiredNameCell,
  textCell,
  wordCell,
  yesNoCell,
} from './cells.ts';
import { missingOxides, molesOfCells, oxideColumns } from './composition-cells.ts';
import { missingColumnNotes, weightNotes } from './composition-notes.ts';
import type { CellStyle, RowValues } from './sheet.ts';

const THICKNESS = { what: 'a thickness in mm', least: 0, most: 20, reason: 'a coat of glaze' };
const GLOSS = { what: 'gloss units at 60 degrees', least: 0, most: 300, reason: 'ISO 2813' };

/** The words of the `surface` column, and what the fit takes each for. */
export const VERDICT_OF_SURFACE = {
  gloss: 'gloss',
  matte: 'matte',
  'semi-matte': 'matte',
  underfired: 'underfired',
  melted: 'melted',
  overfired: 'overfired',
} as const satisfies Readonly<Record<string, Verdict>>;

type SurfaceWord = keyof typeof VERDICT_OF_SURFACE;

const columns = ({ mark, allowsComma }: CellStyle) => ({
  tile: requiredNameCell('a tile name'),
  recipe: nameCell(),
  blend: nameCell(),
  ...oxideColumns(mark),
  firing: nameCell(),
  cone: coneCell(allowsComma),
  surface: wordCell(Object.keys(VERDICT_OF_SURFACE) as SurfaceWord[]),
  drip: wordCell(['melted', 'unmelted']),
  crazing: wordCell(['none', 'wide', 'fine']),
  shivering: yesNoCell(),
  body: nameCell(),
  shelf: nameCell(),
  thickness_mm: numberCell(mark, THICKNESS),
  gloss_units: numberCell(mark, GLOSS),
  judged_by: nameCell(),
  note: textCell(),
});

export type TileValues = RowValues<ReturnType<typeof columns>>;

/** What tiles.csv, or one CSV alone, may hold. */
export const tileKind = {
  name: 'tiles.csv',
  columns,
  numbers: [...OXIDES, 'cone', 'thickness_mm', 'gloss_units'],
  missing: missingColumns,
  noted: compositionNotes,
};

const GIVEN_BY_OXIDES = { noun: 'tile', which: ' given by oxides' };

function compositionNotes(rows: readonly TileValues[], has: (column: string) => boolean): string[] {
  const given = rows
    .map(({ tile = '', recipe, ...values }) => ({
      name: tile,
      recipe,
      amounts: molesOfCells(values),
    }))
    .filter(({ recipe, amounts }) => recipe === undefined && Object.keys(amounts).length > 0);
  return [
    ...missingColumnNotes(has, given.length, GIVEN_BY_OXIDES),
    ...weightNotes(given, GIVEN_BY_OXIDES),
  ];
}

function missingColumns(has: (column: string) => boolean) {
  const hasOxides = OXIDES.some(has);
  const own = ['tile', 'surface']
    .filter((column) => !has(column))
    .map((column) => ({ column, message: 'expected this column, found none' }));
  const composition = 'expected a column recipe or oxides in moles, found neither';
  const heat = 'expected a column firing or cone, found neither';
  return [
    ...own,
    ...(hasOxides ? missingOxides(has) : []),
    ...(hasOxides || has('recipe') ? [] : [{ column: 'recipe', message: composition }]),
    ...(has('firing') || has('cone') ? [] : [{ column: 'cone', message: heat }]),
  ];
}
