import { alkaliShare } from '../../src/chemistry/unity.ts';
import { chosen, type Chance } from './chance.ts';
import type { FiredTile, TrueSurface } from './tiles.ts';

/** What was written down about one tile. */
export interface Verdict {
  /** The word in the `surface` column; '' where nobody has looked yet. */
  readonly surface: string;
  readonly drip: '' | 'melted' | 'unmelted';
  readonly note: string;
  /** The verdict on paper is not what the tile is. */
  readonly isWrong: boolean;
}

const WRONG_SHARE = 0.02;
const OVERFIRED = 4;
const OVERFIRED_FROM = 12;
const MELTED_ONLY = 4;
export const LEFT_UNJUDGED = 5;

/** Half of the wrong verdicts confuse matte and underfired; the others anything else. */
const CONFUSIONS: readonly (readonly [TrueSurface, TrueSurface])[] = [
  ['matte', 'underfired'],
  ['gloss', 'matte'],
  ['underfired', 'matte'],
  ['matte', 'gloss'],
  ['matte', 'underfired'],
  ['gloss', 'underfired'],
];

/**
 * The verdicts of a whole archive, flaws and all.
 *
 * @param tiles - tiles as they truly are
 * @param chance - decides who errs and where
 * @returns one verdict a tile, by the tile's name
 */
export function drawVerdicts(
  tiles: readonly FiredTile[],
  chance: Chance,
): ReadonlyMap<string, Verdict> {
  const lastFiring = tiles.at(-1)?.firing;
  const unjudged = chosen(
    tiles.filter((t) => t.firing === lastFiring),
    LEFT_UNJUDGED,
    chance,
  );
  const overfired = chosen(mostFluid(tiles), OVERFIRED, chance);
  const plain = tiles.filter((t) => !unjudged.includes(t) && !overfired.includes(t));
  const wrong = wrongVerdicts(plain, chance);
  const meltedTiles = plain.filter((t) => t.surface !== 'underfired' && !wrong.has(t.tile));
  const half = chosen(meltedTiles, MELTED_ONLY, chance);
  const judged = (tile: FiredTile): Verdict => {
    if (unjudged.includes(tile)) return verdict('', '', 'not looked at yet');
    if (overfired.includes(tile)) return verdict('overfired', 'melted', 'ran on to the shelf');
    const error = wrong.get(tile.tile);
    if (error) return { ...verdict(error), isWrong: true };
    if (half.includes(tile)) return verdict('melted', 'melted', 'label over the face');
    return tile.surface === 'underfired' ? unmelted(tile, chance) : melted(tile, chance);
  };
  return new Map(tiles.map((tile) => [tile.tile, judged(tile)]));
}

function verdict(surface: string, drip: Verdict['drip'] = '', note = ''): Verdict {
  return { surface, drip, note, isWrong: false };
}

/** Glossy tiles of the hottest loads, those with the least to stiffen them. */
function mostFluid(tiles: readonly FiredTile[]): readonly FiredTile[] {
  const stiffness = ({ unity }: FiredTile) =>
    (unity.SiO2 ?? 0) + 4 * (unity.Al2O3 ?? 0) - 2 * (unity.B2O3 ?? 0) - alkaliShare(unity);
  return tiles
    .filter((t) => t.firing.setCone === 7 && t.surface === 'gloss')
    .sort((a, b) => stiffness(a) - stiffness(b))
    .slice(0, OVERFIRED_FROM);
}

/** Wrong words by tile. */
function wrongVerdicts(
  tiles: readonly FiredTile[],
  chance: Chance,
): ReadonlyMap<string, TrueSurface> {
  const wrong = new Map<string, TrueSurface>();
  const count = Math.round(WRONG_SHARE * tiles.length);
  for (let done = 0; done < count; done += 1) {
    const [truly, written] = CONFUSIONS[done % CONFUSIONS.length];
    const open = tiles.filter((t) => t.surface === truly && !wrong.has(t.tile));
    chosen(open, 1, chance).forEach((t) => wrong.set(t.tile, written));
  }
  return wrong;
}

/** An underfired tile: some look melted but for the drip, which settles it. */
function unmelted(tile: FiredTile, chance: Chance): Verdict {
  const { matte, gloss, underfired } = tile.probability;
  const looksMelted = underfired < 0.9 && chance.uniform() < 0.4;
  if (looksMelted) {
    const face = chance.uniform() * (matte + gloss) < gloss ? 'gloss' : 'matte';
    return verdict(face, 'unmelted', 'drip still sugary');
  }
  const isDry = underfired > 0.95 && chance.uniform() < 0.3;
  return verdict('underfired', chance.uniform() < 0.4 ? 'unmelted' : '', isDry ? 'dry' : '');
}

function melted({ surface, probability }: FiredTile, chance: Chance): Verdict {
  const { matte, gloss } = probability;
  const isNearGloss = surface === 'matte' && gloss / (matte + gloss) > 0.2;
  const isSemi = isNearGloss && chance.uniform() < 0.6;
  const drip = chance.uniform() < 0.5 ? 'melted' : '';
  return verdict(isSemi ? 'semi-matte' : surface, drip, isSemi ? 'satin' : '');
}
