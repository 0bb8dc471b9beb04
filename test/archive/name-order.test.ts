import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { byName, inNameOrder } from '../../src/archive/name-order.ts';

describe('the order of names', () => {
  it('goes by the value of figures, and by character otherwise', () => {
    const names = ['K10', 'K2', 'K02', 'k1', 'A', '10', '9', 'K2b', ''];
    expect([...names].sort(byName)).toEqual(['', '9', '10', 'A', 'K02', 'K2', 'K2b', 'K10', 'k1']);
  });

  it('is the same whatever order the names come in', () => {
    const name = fc.string({
      unit: fc.constantFrom('0', '1', '2', '9', 'a', 'B', ' '),
      maxLength: 5,
    });
    fc.assert(
      fc.property(fc.uniqueArray(name, { maxLength: 8 }), (names) => {
        const sorted = inNameOrder(names, (one) => one);
        expect(inNameOrder([...names].reverse(), (one) => one)).toEqual(sorted);
        for (const [i, one] of sorted.entries()) {
          for (const later of sorted.slice(i + 1)) expect(byName(one, later)).toBeLessThan(0);
        }
      }),
      { seed: 1 },
    );
  });
});
