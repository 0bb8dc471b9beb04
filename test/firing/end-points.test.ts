import { describe, expect, it } from 'vitest';
import { coneIndex } from '../../src/firing/cone.ts';
import { coneNearestToC, endPointC, endPointRangeC } from '../../src/firing/end-points.ts';
import { publishedTable } from '../reference/chemistry-tables.ts';

// Source: datasets/published/cone-temperatures.csv, self-supporting series: verified.
const rows = publishedTable('cone-temperatures.csv').filter(
  ({ series }) => series === 'self_supporting',
);
const column = (rate: string) =>
  rows
    .filter((row) => row['heating_rate_C_per_h_last_100C'] === rate)
    .map((row): [string, number] => [row['cone'], Number(row['temperature_C'])]);

describe('the end points of cones', () => {
  it.each(column('15'))('cone %s at 15 °C an hour: %i °C', (cone, celsius) => {
    expect(endPointRangeC(coneIndex(cone)).slowC).toBe(celsius);
  });

  it.each(column('60'))('cone %s at 60 °C an hour: %i °C', (cone, celsius) => {
    expect(endPointC(coneIndex(cone))).toBe(celsius);
    if (!cone.includes('.')) expect(coneNearestToC(celsius)).toBe(coneIndex(cone));
  });

  it.each(column('150'))('cone %s at 150 °C an hour: %i °C', (cone, celsius) => {
    expect(endPointRangeC(coneIndex(cone)).fastC).toBe(celsius);
  });

  it('lie between those of a slow and a fast firing', () => {
    for (let index = -21; index <= 42; index += 0.25) {
      const { slowC, fastC } = endPointRangeC(index);
      expect(slowC).toBeLessThanOrEqual(endPointC(index));
      expect(fastC).toBeGreaterThan(endPointC(index));
    }
  });

  it('refuse what is no number', () => {
    expect(() => endPointRangeC(Number.NaN)).toThrow('coneIndex must be a number, got NaN');
    expect(() => coneNearestToC(Number.NaN)).toThrow('celsius must be a number, got NaN');
  });
});
