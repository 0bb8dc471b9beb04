import type { Unity } from '../../src/chemistry/unity.ts';
import { unityOf, type BatchLine } from './batch.ts';
import type { Chance } from './chance.ts';
import { heatOnPaper, type DrawnFiring } from './firings.ts';
import type { LoadContents } from './plan.ts';
import type { StudioRecipe } from './recipes.ts';
import { trueProbability, type SurfaceTruth } from './surfaces.ts';

export type TrueSurface = keyof SurfaceTruth;

/** A tile as it truly came out of the kiln, before anybody looked at it. */
export interface FiredTile {
  readonly tile: string;
  readonly recipe: StudioRecipe;
  readonly firing: DrawnFiring;
  readonly shelf: string;
  /** Composition as weighed, not as meant. */
  readonly unity: Unity;
  /** Heat truly reached, as a number of cones. */
  readonly coneIndex: number;
  readonly probability: SurfaceTruth;
  readonly surface: TrueSurface;
}

const WEIGHING_SD = 0.015;

/**
 * Every tile of every load, with its true surface.
 *
 * A blend is mixed once and dipped for each load; a single glaze is mixed anew each time.
 *
 * @param firings - the loads
 * @param recipes - recipes by firing
 * @param weighing - decides the errors of the scales
 * @param surfaces - decides shelves and surfaces
 * @returns tiles in the order of the loads
 */
export function drawTiles(
  firings: readonly DrawnFiring[],
  recipes: LoadContents,
  weighing: Chance,
  surfaces: Chance,
): readonly FiredTile[] {
  const mixed = new Map<string, Unity>();
  const mixOf = ({ recipe, blend, lines }: StudioRecipe, firing: string): Unity => {
    const mixing = blend === undefined ? `${recipe} for ${firing}` : recipe;
    const mix = mixed.get(mixing) ?? unityOf(weighed(lines, weighing));
    mixed.set(mixing, mix);
    return mix;
  };
  return firings.flatMap((firing) =>
    (recipes.get(firing.firing) ?? []).map((recipe, place) => {
      const unity = mixOf(recipe, firing.firing);
      const tile = `${firing.firing}-${String(place + 1).padStart(2, '0')}`;
      return fired({ tile, recipe, firing, unity }, surfaces);
    }),
  );
}

function weighed(lines: readonly BatchLine[], chance: Chance): readonly BatchLine[] {
  return lines.map((line) => ({
    ...line,
    parts: line.parts * (1 + WEIGHING_SD * chance.normal()),
  }));
}

function fired(
  tile: Pick<FiredTile, 'tile' | 'recipe' | 'firing' | 'unity'>,
  chance: Chance,
): FiredTile {
  const { firing, unity } = tile;
  const names = [...firing.shelves.keys()];
  // Where no shelf has a witness cone of its own, tests stand in the middle.
  const shelf = names[Math.floor(chance.uniform() * names.length)] ?? 'middle';
  const coneIndex = heatOnPaper(firing, shelf) + firing.loadErrorCones;
  const probability = trueProbability(unity, coneIndex);
  return { ...tile, shelf, coneIndex, probability, surface: drawn(probability, chance) };
}

function drawn({ underfired, matte }: SurfaceTruth, chance: Chance): TrueSurface {
  const ticket = chance.uniform();
  if (ticket < underfired) return 'underfired';
  return ticket < underfired + matte ? 'matte' : 'gloss';
}
