import { expect, it } from 'vitest';
import { readArchive } from '../../src/archive/read-archive.ts';
import { filesOf } from '../support/builders.ts';

const FIRINGS = 'firing,set_cone\nL1,6\n';
const tiles = (shelf: string) =>
  `tile,firing,shelf,surface,SiO2,Al2O3,CaO\nT1,L1,${shelf},gloss,3,0.4,1\n`;

it('a tile on shelf "Top" has the heat of the witness cone that was written for "top"', () => {
  const files = { 'firings.csv': FIRINGS, 'witness.csv': 'firing,shelf,cone\nL1,top,7\n' };
  const { archive, faults } = readArchive(filesOf({ ...files, 'tiles.csv': tiles('Top') }));
  expect(faults).toEqual([]);
  expect(archive.tiles[0].heat).toEqual({ cone: '7', coneIndex: 7, source: 'witness cone' });
  expect(archive.tiles[0].shelf).toBe('Top');
});

it('one shelf written "top" and "Top" in witness.csv is the same shelf twice: a fault', () => {
  const witness = 'firing,shelf,cone\nL1,top,7\nL1,Top,6\n';
  const files = { 'firings.csv': FIRINGS, 'witness.csv': witness, 'tiles.csv': tiles('middle') };
  expect(readArchive(filesOf(files)).faults[0].message).toContain('expected each shelf once');
});
