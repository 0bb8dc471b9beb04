/**
 * Files by which the peers of `peers.py` take part. `writeStudio` writes `FAMILY-SIZE-SEED[-wWRONG].json`
 * with tiles and asked points; `peers.py DIR` writes `....peers.json` beside it; `peerTrial` adds what the
 * peers answered to a trial.
 */
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Unity } from '../../../src/chemistry/unity.ts';
import type { LearnerTrial, Trial } from './trial.ts';
import { truthsOf } from './trial.ts';
import { ASKED_CONES } from './learner.ts';
import { measured } from './measures.ts';
import { askedPoints } from './points.ts';
import { drawStudio, type StudioAsked } from './studio.ts';

/** What `peers.py` writes: for each peer the seconds it took and a row of probabilities an answer. */
type PeersFile = Readonly<
  Record<string, { readonly seconds: number; readonly rows: readonly (readonly number[])[] }>
>;

/**
 * Writes what a peer may see of a studio.
 *
 * @param folder - where to
 * @param asked - which studio
 */
export function writeStudio(folder: string, asked: StudioAsked): void {
  const { archive } = drawStudio(asked);
  const tiles = archive.tiles.map(({ unity, heat, verdict, load, blend }) => ({
    inputs: inputsOf(unity, heat!.coneIndex),
    surface: verdict,
    load,
    blend: blend ?? null,
  }));
  const points = askedPoints(asked.seed).flatMap((unity) =>
    ASKED_CONES.map((cone) => inputsOf(unity, cone)),
  );
  mkdirSync(folder, { recursive: true });
  writeFileSync(`${stemOf(folder, asked)}.json`, JSON.stringify({ tiles, points }));
}

/**
 * A trial with the answers of the peers, as far as `peers.py` has written them.
 *
 * @param folder - where they are
 * @param done - the trial of the learners
 * @returns the same with a row a peer
 */
export function peerTrial(folder: string, done: Trial): Trial {
  const file = `${stemOf(folder, done)}.peers.json`;
  if (!existsSync(file)) return done;
  const peers = JSON.parse(readFileSync(file, 'utf8')) as PeersFile;
  const studio = drawStudio(done);
  const truths = truthsOf(studio, done.seed);
  const rows = Object.entries(peers).map(([learner, peer]): LearnerTrial => {
    const answers = peer.rows.map(([underfired, matte, gloss]) => ({
      probability: { underfired, matte, gloss },
    }));
    const own = measured(truths, answers, studio.archive);
    return { learner, ...own, placeError: null, fitMs: 1000 * peer.seconds, predictMs: 0 };
  });
  return { ...done, learners: [...done.learners, ...rows] };
}

function stemOf(folder: string, { family, size, seed, wrongShare }: StudioAsked): string {
  const wrong = wrongShare === undefined ? '' : `-w${wrongShare}`;
  return join(folder, `${family}-${size}-${seed}${wrong}`);
}

/** SiO2, Al2O3, B2O3, KNaO, MgO, ZnO, cone. */
function inputsOf(unity: Unity, coneIndex: number): number[] {
  const { SiO2 = 0, Al2O3 = 0, B2O3 = 0, K2O = 0, Na2O = 0, MgO = 0, ZnO = 0 } = unity;
  return [SiO2, Al2O3, B2O3, K2O + Na2O, MgO, ZnO, coneIndex];
}
