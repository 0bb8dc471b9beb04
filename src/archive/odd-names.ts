import type { Firing, Recipe, Tile } from './archive.ts';
import { listed, quoted } from './found-text.ts';
import { grouped } from './grouped.ts';
import { byName, inNameOrder } from './name-order.ts';
import { shortened } from './odd-words.ts';

/** Where the names of an archive stand. */
export interface NamesLooked {
  readonly tiles: readonly Tile[];
  readonly firings: readonly Firing[];
  readonly recipes: readonly Recipe[];
}

/**
 * Names of kilns, loads or recipes that differ in nothing that a person would call a difference.
 *
 * Shelves are left aside: capitals make no difference there.
 *
 * @param looked - tiles, firings and recipes
 * @returns a sentence for each kind of name
 */
export function namesAlike({ tiles, firings, recipes }: NamesLooked): string[] {
  const kilns = firings.flatMap(({ kiln }) => kiln ?? []);
  const loads = [...firings, ...tiles].flatMap(({ firing }) => firing ?? []);
  return [
    ...alike('kilns', kilns),
    ...alike('loads', loads),
    ...alike(
      'recipes',
      recipes.map(({ recipe }) => recipe),
    ),
  ];
}

const NUMBER_WORDS: Readonly<Record<number, string>> = { 2: 'two', 3: 'three', 4: 'four' };

function alike(noun: string, names: readonly string[]): string[] {
  const groups = [...grouped(new Set(names), folded).values()].filter((own) => own.length > 1);
  if (groups.length === 0) return [];
  const sorted = groups.map((own) => [...own].sort(byName));
  const pairs = inNameOrder(sorted, ([first = '']) => first).map((own) => {
    const taken = NUMBER_WORDS[own.length] ?? String(own.length);
    return `${listed(own.map(quoted), 'and')} are taken as ${taken}`;
  });
  return [
    `${noun} ${shortened(pairs)}: alike but for capitals, spaces or accents, so probably one`,
  ];
}

/** A name without capitals, spaces and accents; of a script without them, the name itself. */
function folded(name: string): string {
  return name
    .normalize('NFKD')
    .replace(/[\p{M}\s]/gu, '')
    .toLowerCase();
}
