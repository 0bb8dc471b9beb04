import type { Archive, Tile } from './archive.ts';
import { isCompositionNote, wildNotes } from './composition-notes.ts';

/**
 * Tiles whose unity formula lies where no glaze does.
 *
 * @param tiles - in any order
 * @returns one sentence that names them, or none
 */
export function oddCompositions(tiles: readonly Pick<Tile, 'tile' | 'unity'>[]): string[] {
  return wildNotes(tiles.map(({ tile, unity }) => ({ name: tile, unity })));
}

/**
 * What puts the compositions of an archive in doubt: a fit on them is no better than they are.
 *
 * @param archive - archive as read
 * @returns notes on columns that are not there, on weights given for moles, on impossible formulas
 * @example
 * const csv = 'tile,SiO2,Al2O3,K2O,CaO,cone,surface\nA,3,0.4,0.3,0.7,6,gloss\n';
 * const { archive } = readArchive(new Map([['a.csv', new TextEncoder().encode(csv)]]));
 * compositionDoubts(archive); // ['a.csv: no B2O3 column: read as 0 for the 1 tile given by oxides']
 */
export function compositionDoubts({ notes, tiles }: Pick<Archive, 'notes' | 'tiles'>): string[] {
  return [...notes.filter(isCompositionNote), ...oddCompositions(tiles)];
}
