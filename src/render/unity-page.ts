import { hazardNotes } from '../chemistry/hazards.ts';
import { FLUXES, OXIDES, type Oxide } from '../chemistry/oxides.ts';
import { alkaliShare, type Unity } from '../chemistry/unity.ts';
import { alignedLines } from './aligned.ts';
import { silicaToAlumina } from './composition-words.ts';
import { fixed } from './figures.ts';
import { INDENT, pageOf, point, prose, type Look, type Section } from './page.ts';
import { cutTo, printable, textWidth } from './printable.ts';

/** A recipe with its unity formula. */
export interface RecipeUnity {
  readonly recipe: string;
  readonly unity: Unity;
}

const WIDEST_NAME = 22;
const GLASS: readonly Oxide[] = ['SiO2', 'Al2O3', 'B2O3'];
const OTHERS = OXIDES.filter((oxide) => !GLASS.includes(oxide) && !isFlux(oxide));

/**
 * The page of `unity`: recipes in rows, oxides in columns, in as many tables as the width asks for.
 *
 * @param recipes - recipes with their unity formulas
 * @param look - width and marking
 * @returns the page
 * @example
 * const recipes = [{ recipe: 'Clear', unity: { SiO2: 3.5, Al2O3: 0.5, K2O: 0.3, CaO: 0.7 } }];
 * unityPage(recipes, PLAIN_LOOK).split('\n')[2];
 * // '  Clear   3.500  0.500     .         7.0          0.30'
 */
export function unityPage(recipes: readonly RecipeUnity[], look: Look): string {
  const fluxes = FLUXES.filter((oxide) => isHeld(recipes, oxide));
  const others = OTHERS.filter((oxide) => isHeld(recipes, oxide));
  return pageOf(
    [
      { heading: 'Glass formers, moles per mole of flux', lines: glassLines(recipes, look) },
      { heading: 'Fluxes, which sum to 1', lines: oxideLines(recipes, fluxes, look) },
      { heading: 'Iron, colourants, opacifiers', lines: oxideLines(recipes, others, look) },
      hazardSection(recipes, look),
    ],
    look,
  );
}

function isFlux(oxide: Oxide): boolean {
  return (FLUXES as readonly Oxide[]).includes(oxide);
}

function isHeld(recipes: readonly RecipeUnity[], oxide: Oxide): boolean {
  return recipes.some(({ unity }) => (unity[oxide] ?? 0) > 0);
}

function glassLines(recipes: readonly RecipeUnity[], { columns }: Look): string[] {
  const head = ['recipe', ...GLASS, 'SiO2:Al2O3', 'alkali share'];
  const rows = recipes.map(({ recipe, unity }) => [
    nameCell(recipe),
    ...GLASS.map((oxide) => amountCell(unity[oxide])),
    fixed(silicaToAlumina(unity), 1),
    fixed(alkaliShare(unity), 2),
  ]);
  return alignedLines({ rows: [head, ...rows], align: rightBut(head), indent: INDENT, columns });
}

/** Columns of one oxide take five figures and two spaces. */
const OXIDE_COLUMNS = 7;

/** The oxides in tables that fit the width; a table leaves out recipes that hold none of its oxides. */
function oxideLines(
  recipes: readonly RecipeUnity[],
  oxides: readonly Oxide[],
  { columns }: Look,
): string[] {
  if (oxides.length === 0) return [];
  const names = recipes.map(({ recipe }) => textWidth(nameCell(recipe)));
  const room = columns - INDENT - names.reduce((a, b) => Math.max(a, b), textWidth('recipe'));
  const perTable = Math.max(1, Math.floor(room / OXIDE_COLUMNS));
  const tables = Array.from({ length: Math.ceil(oxides.length / perTable) }, (_, i) =>
    oxides.slice(i * perTable, (i + 1) * perTable),
  );
  return tables.flatMap((own, i) => {
    const head = ['recipe', ...own];
    const rows = recipes
      .filter(({ unity }) => own.some((oxide) => (unity[oxide] ?? 0) > 0))
      .map(({ recipe, unity }) => [nameCell(recipe), ...own.map((o) => amountCell(unity[o]))]);
    const lines = alignedLines({ rows: [head, ...rows], align: rightBut(head), indent: INDENT });
    return i === 0 ? lines : ['', ...lines];
  });
}

function nameCell(recipe: string): string {
  return cutTo(printable(recipe), WIDEST_NAME);
}

/** Thousandths: colourants act in them. What is not there is a dot. */
function amountCell(moles = 0): string {
  return moles > 0 ? fixed(moles, 3) : '.';
}

function rightBut(head: readonly string[]) {
  return head.map((_, i) => (i === 0 ? ('left' as const) : ('right' as const)));
}

function hazardSection(recipes: readonly RecipeUnity[], look: Look): Section {
  const held = recipes.map(({ recipe, unity }) => ({ recipe, notes: hazardNotes(unity) }));
  const named = held.filter(({ notes }) => notes.length > 0);
  const lines = named.map(({ recipe, notes }) =>
    point(`${recipe}: ${lowered(notes[0] ?? '')}`, look),
  );
  const demands = [...new Set(named.flatMap(({ notes }) => notes.slice(1)))];
  return { heading: 'Mind', lines: [...lines, ...demands.map((one) => prose(one, look))] };
}

function lowered(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}
