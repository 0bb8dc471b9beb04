import { batchFor, type Aim, type BatchLine } from './batch.ts';
import { SINGLES } from './singles.ts';

/** A recipe of the studio, with the blend that it belongs to, if any. */
export interface StudioRecipe {
  readonly recipe: string;
  readonly blend?: string;
  readonly lines: readonly BatchLine[];
}

interface Grid {
  readonly blend: string;
  /** Letter that the names of its recipes begin with. */
  readonly letter: string;
  readonly silica: readonly number[];
  readonly alumina: readonly number[];
  readonly flux: Omit<Aim, 'silica' | 'alumina'>;
  readonly palette: readonly string[];
}

const CHALK = [
  'Wendle potash spar',
  'Quern lime frit',
  'Quern soda frit',
  'Pemberlow kaolin',
  'alumina hydrate',
  'quartz',
  'calcite',
];
const DOLOMITE = [...CHALK, 'dolomite'];
const FRIT = [
  'Oxter soda spar',
  'Quern lime frit',
  'Quern soda frit',
  'Pemberlow kaolin',
  'alumina hydrate',
  'quartz',
  'calcite',
  'zinc oxide',
];

/** Silica and alumina varied at one flux mix each. */
const GRIDS: readonly Grid[] = [
  {
    blend: 'chalk grid',
    letter: 'A',
    silica: [2.2, 2.7, 3.2, 3.7, 4.2, 4.8],
    alumina: [0.27, 0.39, 0.51, 0.63, 0.75],
    flux: { boric: 0.17, alkali: 0.3 },
    palette: CHALK,
  },
  {
    blend: 'dolomite grid',
    letter: 'B',
    silica: [2.1, 2.7, 3.3, 3.9, 4.5],
    alumina: [0.26, 0.38, 0.5, 0.62],
    flux: { boric: 0.1, alkali: 0.22, magnesia: 0.15 },
    palette: DOLOMITE,
  },
  {
    blend: 'frit grid',
    letter: 'C',
    silica: [2.3, 3.0, 3.7, 4.4, 5.1],
    alumina: [0.25, 0.4, 0.55, 0.7],
    flux: { boric: 0.3, alkali: 0.36, zinc: 0.06 },
    palette: FRIT,
  },
  {
    blend: 'stony grid',
    letter: 'D',
    silica: [2.0, 2.7, 3.4, 4.1, 4.8],
    alumina: [0.28, 0.42, 0.56, 0.7],
    flux: { boric: 0.04, alkali: 0.3 },
    palette: CHALK,
  },
];

/** One thing varied at a time, from a glaze the studio knew. */
const LINES: readonly {
  readonly blend: string;
  readonly letter: string;
  readonly aims: readonly Aim[];
  readonly palette: readonly string[];
}[] = [
  {
    blend: 'boron line',
    letter: 'K',
    aims: [0, 0.06, 0.12, 0.18, 0.25, 0.32, 0.4].map((boric) => ({
      silica: 3.6,
      alumina: 0.5,
      boric,
      alkali: 0.26,
    })),
    palette: CHALK,
  },
  {
    blend: 'magnesia line',
    letter: 'L',
    aims: [0, 0.06, 0.12, 0.18, 0.24, 0.3].map((magnesia) => ({
      silica: 3.1,
      alumina: 0.42,
      boric: 0.15,
      alkali: 0.28,
      magnesia,
    })),
    palette: DOLOMITE,
  },
  {
    blend: 'silica line',
    letter: 'M',
    aims: [2.0, 2.5, 3.0, 3.5, 4.0, 4.5, 5.0].map((silica) => ({
      silica,
      alumina: 0.4,
      boric: 0.12,
      alkali: 0.3,
    })),
    palette: CHALK,
  },
  {
    blend: 'alkali line',
    letter: 'N',
    aims: [0.15, 0.2, 0.25, 0.31, 0.37, 0.43].map((alkali) => ({
      silica: 3.5,
      alumina: 0.57,
      boric: 0.15,
      alkali,
    })),
    palette: CHALK,
  },
  {
    blend: 'alumina line',
    letter: 'P',
    aims: [0.22, 0.32, 0.42, 0.52, 0.62, 0.72, 0.82].map((alumina) => ({
      silica: 3.4,
      alumina,
      boric: 0.2,
      alkali: 0.26,
    })),
    palette: CHALK,
  },
  {
    blend: 'zinc line',
    letter: 'Q',
    aims: [0, 0.05, 0.1, 0.15, 0.2].map((zinc) => ({
      silica: 2.8,
      alumina: 0.48,
      boric: 0.22,
      alkali: 0.34,
      zinc,
    })),
    palette: FRIT,
  },
];

function gridRecipes({
  blend,
  letter,
  silica,
  alumina,
  flux,
  palette,
}: Grid): readonly StudioRecipe[] {
  return silica.flatMap((si, row) =>
    alumina.map((al, column) => ({
      recipe: `${letter}${row + 1}${column + 1}`,
      blend,
      lines: batchFor({ silica: si, alumina: al, ...flux }, palette),
    })),
  );
}

function lineRecipes({
  blend,
  letter,
  aims,
  palette,
}: (typeof LINES)[number]): readonly StudioRecipe[] {
  return aims.map((aim, place) => ({
    recipe: `${letter}${place + 1}`,
    blend,
    lines: batchFor(aim, palette),
  }));
}

/** Every recipe of the studio: grids, lines, then single glazes. The same for every seed. */
export const RECIPES: readonly StudioRecipe[] = [
  ...GRIDS.flatMap(gridRecipes),
  ...LINES.flatMap(lineRecipes),
  ...SINGLES,
];
