import { OXIDES } from '../../src/chemistry/oxides.ts';
import { BODIES } from './crazing.ts';
import { csv } from './csv.ts';
import { SHELF } from './materials.ts';
import { RECIPES } from './recipes.ts';

/**
 * The files that no chance touches: recipes, materials and bodies.
 *
 * @returns file name and CSV text of each
 */
export function shelfFiles(): readonly (readonly [string, string])[] {
  return [
    ['recipes.csv', recipesFile()],
    ['materials.csv', materialsFile()],
    ['bodies.csv', bodiesFile()],
  ];
}

function recipesFile(): string {
  const rows = RECIPES.flatMap(({ recipe, lines }) =>
    lines.map(({ material, parts, over100 }) => [recipe, material, parts, over100 ? 'yes' : '']),
  );
  return csv(['recipe', 'material', 'parts', 'over_100'], rows);
}

function materialsFile(): string {
  const held = OXIDES.filter((oxide) => SHELF.some(({ analysis }) => analysis?.[oxide]));
  const rows = SHELF.map(({ material, analysis, basis, loiPercent, formula }) => [
    ...[material, formula ?? ''],
    ...held.map((oxide) => analysis?.[oxide] ?? ''),
    ...[loiPercent ?? '', basis ?? ''],
  ]);
  return csv(['material', 'formula', ...held, 'loi', 'basis'], rows);
}

function bodiesFile(): string {
  const rows = BODIES.map(({ body, cone, absorptionPercent, expansionPerK }) => {
    return [body, cone, absorptionPercent, expansionPerK.toFixed(7)];
  });
  return csv(['body', 'cone', 'absorption_pct', 'expansion_per_k'], rows);
}
