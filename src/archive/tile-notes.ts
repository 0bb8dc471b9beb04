import type { Body, Tile } from './archive.ts';
import { counted, listed, quoted } from './found-text.ts';
import { byName, inNameOrder } from './name-order.ts';
import { ownPeakC } from './own-peak.ts';
import type { Register } from './register.ts';

/** Names that a note spells out; beyond that it gives only the number. */
const SHOWN_NAMES = 5;

/**
 * What was understood of the tiles that a reader might not expect, in sentences.
 *
 * @param tiles - the sound tiles
 * @param bodies - the bodies, where there is a bodies.csv
 * @returns one note a matter
 */
export function tileNotes(tiles: readonly Tile[], bodies: Register<Body> | undefined): string[] {
  const count = (holds: (tile: Tile) => boolean) => tiles.filter(holds).length;
  const notes = [
    ...note(count(isSemiMatte), (n) => `${counted(n, 'semi-matte tile')} counted as matte`),
    ...dripNote(tiles.filter(isOverruled)),
    ...note(
      count(({ heat }) => heat?.source === 'set cone'),
      (n) =>
        `${counted(n, 'tile')} with the cone that the kiln was set to: no witness cone was read for their ` +
        'shelf or firing',
    ),
    ...note(
      count(({ heat, other }) => heat?.source === 'tile' && ownPeakC(other) !== undefined),
      (n) => `peak_c of ${counted(n, 'tile')} compared with the cone, used for nothing else`,
    ),
    ...note(
      count(({ firing }) => firing === undefined),
      (n) => `${counted(n, 'tile')} without a firing: each counts as a load of its own`,
    ),
    ...note(
      count(({ verdict }) => verdict === 'unjudged'),
      (n) => `${counted(n, 'tile')} not judged yet: kept, not fitted`,
    ),
    ...note(
      count(({ verdict }) => verdict === 'overfired'),
      (n) => `${counted(n, 'overfired tile')} set aside: kept, not fitted`,
    ),
  ];
  return bodies === undefined ? notes : [...notes, ...bodyNotes(tiles, bodies)];
}

function note(count: number, words: (count: number) => string): string[] {
  return count === 0 ? [] : [words(count)];
}

function isSemiMatte({ surfaceWritten, verdict }: Tile): boolean {
  return surfaceWritten === 'semi-matte' && verdict === 'matte';
}

function isOverruled({ drip, surfaceWritten }: Tile): boolean {
  return drip === 'unmelted' && surfaceWritten !== 'underfired';
}

function dripNote(overruled: readonly Tile[]): string[] {
  const inOrder = inNameOrder(overruled, ({ tile }) => tile);
  const named = inOrder.slice(0, SHOWN_NAMES).map(({ tile, surfaceWritten }) => {
    return `${quoted(tile)} (${surfaceWritten || 'not judged'})`;
  });
  const left = overruled.length - named.length;
  const names = left > 0 ? `${named.join(', ')} and ${left} more` : listed(named, 'and');
  return note(
    overruled.length,
    (n) => `${counted(n, 'tile')} counted as underfired for an unmelted drip: ${names}`,
  );
}

function bodyNotes(tiles: readonly Tile[], bodies: Register<Body>): string[] {
  const isUnknown = (body: string) => !bodies.sound.has(body) && !bodies.faulty.has(body);
  const unknown = new Set(tiles.flatMap(({ body }) => body ?? []).filter(isUnknown));
  return [...unknown]
    .sort(byName)
    .slice(0, SHOWN_NAMES)
    .map((body) => {
      const advice = bodies.advice(body);
      return `body ${quoted(body)} of the tiles is not in ${bodies.file}${advice}`;
    });
}
