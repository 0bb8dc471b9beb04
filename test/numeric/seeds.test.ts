import { expect, it } from 'vitest';
import { seededGenerator } from '../../src/numeric/random.ts';

const SEEDS = 2000;
const NUMBERS = 40;

it.each([1, 7919])(
  'neighbouring seeds (%d apart) give unrelated numbers from the first on',
  (gap) => {
    const rows = Array.from({ length: SEEDS }, (_, s) => {
      const { normal } = seededGenerator((s + 1) * gap);
      return Array.from({ length: NUMBERS }, normal);
    });
    for (let k = 0; k < NUMBERS; k++) {
      const mean = rows.reduce((sum, row) => sum + row[k], 0) / SEEDS;
      const product = rows.slice(1).reduce((sum, row, s) => sum + row[k] * rows[s][k], 0) / SEEDS;
      // 40 numbers: the largest of 80 standard scores exceeds 4.5 once in 2,000.
      expect(Math.abs(mean) * Math.sqrt(SEEDS)).toBeLessThan(4.5);
      expect(Math.abs(product) * Math.sqrt(SEEDS)).toBeLessThan(4.5);
    }
  },
);
