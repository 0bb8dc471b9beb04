import { describe, expect, it } from 'vitest';
import { lostZero, peakMisfit } from '../../src/archive/lost-zero.ts';
import { coneIndex } from '../../src/firing/cone.ts';
import { endPointC } from '../../src/firing/end-points.ts';
import { publishedTable } from '../reference/chemistry-tables.ts';

describe('endPointC', () => {
  // Source: Edward Orton Jr. Ceramic Foundation, self-supporting cones at 60 degrees C an hour
  // (verified: copies agree; the maker's name from memory).
  it.each([
    ['022', 586],
    ['06', 998],
    ['05.5', 1015],
    ['04', 1063],
    ['03', 1086],
    ['1', 1137],
    ['4', 1162],
    ['5', 1186],
    ['6', 1222],
    ['7', 1239],
    ['8', 1249],
    ['9', 1260],
    ['10', 1285],
    ['14', 1365],
  ])('cone %s is down at %i °C', (cone, endC) => {
    expect(endPointC(coneIndex(cone))).toBe(endC);
  });

  it('rises with the cone, on straight lines between, and says no more beyond its ends', () => {
    for (let index = -21; index < 14; index += 0.25) {
      expect(endPointC(index + 0.25)).toBeGreaterThan(endPointC(index));
    }
    expect(endPointC(6.5)).toBe((1222 + 1239) / 2);
    expect([endPointC(-30), endPointC(42)]).toEqual([586, 1365]);
    expect(() => endPointC(Number.NaN)).toThrow('coneIndex must be a number, got NaN');
  });
});

describe('lostZero', () => {
  it('says that 6 was 06', () => {
    expect(lostZero('6', 998)).toBe(
      'expected a cone that fits peak_c 998, got "6" (about 1222 °C); ' +
        '06 (about 998 °C) fits better: spreadsheets turn 06 into 6',
    );
    expect(lostZero('4', 1070)).toContain('04 (about 1063 °C) fits better');
    expect(lostZero('5.5', 1010)).toContain('05.5 (about 1015 °C) fits better');
    expect(lostZero('18', 715)).toContain('018 (about 715 °C) fits better');
  });

  it.each([
    ['6', 1222],
    ['6', 1185], // 15 degrees C an hour, verified
    ['6', 1111],
    ['6', 1100], // fits neither: what was meant cannot be known
    ['6', 700],
    ['06', 998],
    ['06', 1222],
    ['1', 1109], // 15 degrees C an hour, verified: nearer to the end point of 01, and right
    ['2', 1100], // a slow firing to 2 or a fast one to 02
    ['0.5', 1119],
    ['25', 1400],
  ])('leaves cone %s at %i °C alone', (cone, peakC) => {
    expect(lostZero(cone, peakC)).toBeUndefined();
  });
});

describe('peakMisfit', () => {
  it.each([
    ['6', 1150, 1222, '3'],
    ['6', 1300, 1222, '11'],
    ['6', 1100, 1222, '02'],
    ['6', 700, 1222, '018'],
    ['06', 1222, 998, '6'],
    ['06', 700, 998, '018'],
    ['25', 1222, 1365, '6'],
  ])('cone %s does not go with %i °C', (cone, peakC, usualC, nearestCone) => {
    expect(peakMisfit(cone, peakC)).toEqual({ usualC, nearestCone });
  });

  it('is none at any rate of heating that the chart knows, at any of its cones', () => {
    const rows = publishedTable('cone-temperatures.csv').filter(
      ({ series }) => series === 'self_supporting',
    );
    expect(rows).toHaveLength(111);
    for (const row of rows) {
      expect(peakMisfit(row['cone'], Number(row['temperature_C']))).toBeUndefined();
    }
  });

  it('is none above a cone beyond the chart', () => {
    expect(peakMisfit('25', 1400)).toBeUndefined();
  });
});
