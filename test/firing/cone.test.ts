import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ConeError } from '../../src/errors.ts';
import { coneIndex, coneText } from '../../src/firing/cone.ts';
import { publishedTable } from '../reference/chemistry-tables.ts';

/** The whole cones from 022 to 42, coldest first, as the trade writes them. */
const SERIES = [
  ...Array.from({ length: 22 }, (_, i) => `0${22 - i}`),
  ...Array.from({ length: 42 }, (_, i) => String(i + 1)),
];

describe('coneIndex', () => {
  it.each([
    ['022', -21],
    ['010', -9],
    ['06', -5],
    ['02', -1],
    ['01', 0],
    ['1', 1],
    ['6', 6],
    ['10', 10],
    ['42', 42],
  ])('cone %s is %i', (text, index) => {
    expect(coneIndex(text)).toBe(index);
  });

  it('runs in steps of one over the whole series', () => {
    expect(SERIES.map(coneIndex)).toEqual(SERIES.map((_, i) => i - 21));
  });

  it('keeps 06 and 6 eleven cones apart', () => {
    expect(coneIndex('6') - coneIndex('06')).toBe(11);
  });

  it('reads half cones between their neighbours', () => {
    expect(coneIndex('05.5')).toBe((coneIndex('06') + coneIndex('05')) / 2);
    expect(coneIndex('6.5')).toBe((coneIndex('6') + coneIndex('7')) / 2);
    expect(coneIndex('0.5')).toBe((coneIndex('01') + coneIndex('1')) / 2);
  });

  it.each(['cone 6', 'Cone 6', 'CONE6', ' 6 ', '6.0'])('reads "%s" as 6', (text) => {
    expect(coneIndex(text)).toBe(6);
  });

  it.each([
    ...['', ' ', '0', '00', '006', '000', '0.0', '00.5', 'x', '99', '43', '023', '022.5'],
    ...['42.5', '-3', '+6', '6..5', '6.', '.5', '6,5', '6 7', '6/7', '1e1', '0x6', 'NaN', '6a'],
  ])('refuses "%s" and says what it got', (text) => {
    expect(() => coneIndex(text)).toThrow(ConeError);
    expect(() => coneIndex(text)).toThrow(
      `expected a cone from 022 to 42 such as 6, 06 or 6.5, got "${text}"`,
    );
  });

  it('refuses anything else with the same error, and nothing with another', () => {
    fc.assert(
      fc.property(fc.string({ maxLength: 8 }), (text) => {
        try {
          const index = coneIndex(text);
          expect(index).toBeGreaterThanOrEqual(-21);
          expect(index).toBeLessThanOrEqual(42);
        } catch (error) {
          expect(error).toBeInstanceOf(ConeError);
        }
      }),
    );
  });
});

describe('coneText', () => {
  it('gives every cone of the series back', () => {
    expect(SERIES.map((text) => coneText(coneIndex(text)))).toEqual(SERIES);
  });

  it.each(['05.5', '6.5', '0.5', '01.5', '021.75', '41.25'])('gives %s back', (text) => {
    expect(coneText(coneIndex(text))).toBe(text);
  });

  it('is read back as the same place, to a hundredth', () => {
    fc.assert(
      fc.property(fc.integer({ min: -2100, max: 4200 }), (hundredths) => {
        expect(coneIndex(coneText(hundredths / 100))).toBeCloseTo(hundredths / 100, 10);
      }),
    );
  });

  it('rounds across the step from 01 to 1', () => {
    expect(coneText(0.004)).toBe('01');
    expect(coneText(-0.004)).toBe('01');
    expect(coneText(0.996)).toBe('1');
  });

  it.each([-21.01, 42.01, Number.NaN, Infinity])('refuses %f', (index) => {
    expect(() => coneText(index)).toThrow(RangeError);
    expect(() => coneText(index)).toThrow(`cone index must be from -21 to 42, got ${index}`);
  });
});

// Source: datasets/published/cone-temperatures.csv. Self-supporting series at 15, 60 and 150 °C/h:
// verified; the other series: see the status word of each row.
describe('against published cone charts', () => {
  const rows = publishedTable('cone-temperatures.csv');
  const chartOf = (row: Readonly<Record<string, string>>) =>
    `${row['series']}, ${row['heating_rate_C_per_h_last_100C']}`;
  const charts = [...new Set(rows.map(chartOf))];

  it('are eight', () => {
    expect(charts).toHaveLength(8);
  });

  it.each(charts)('%s °C/h: a higher index is a hotter cone', (chart) => {
    const cones = rows.filter((row) => chartOf(row) === chart);
    const byIndex = cones.toSorted((a, b) => coneIndex(a['cone']) - coneIndex(b['cone']));
    const celsius = byIndex.map((r) => Number(r['temperature_C']));
    expect(celsius).toEqual(celsius.toSorted((a, b) => a - b));
    expect(new Set(celsius).size).toBe(cones.length);
  });

  // Source: Seger 1886 and Binns 1922 by row of published-glazes.csv (verified).
  it('places the cones of the published glazes as their table does', () => {
    const glazes = publishedTable('published-glazes.csv').filter((row) => row['cone'] !== '');
    expect(glazes).toHaveLength(19);
    for (const row of glazes) expect(coneIndex(row['cone'])).toBe(Number(row['cone_order']));
  });
});
