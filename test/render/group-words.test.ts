import { describe, expect, it } from 'vitest';
import { groupNames, groupsTogether } from '../../src/render/group-words.ts';

const account = (...names: string[]) => ({
  parts: names.map((leftOut) => ({ leftOut, tiles: 1, logScore: -1, baseRateLogScore: -1 })),
});

describe('groups left out together', () => {
  it('are told as lots, with how many there are in all', () => {
    const lots = account('loads 1 (1)', 'loads 2 (3)');
    expect(groupNames(lots)).toEqual(['lot 1: 1 load', 'lot 2: 3 loads']);
    expect(groupsTogether(lots)).toBe(4);
  });

  it('are not mistaken for a load that its studio calls so', () => {
    const named = account('loads 1 (1)', 'H02');
    expect(groupNames(named)).toEqual(['loads 1 (1)', 'H02']);
    expect(groupsTogether(named)).toBeUndefined();
    expect(groupsTogether(account())).toBeUndefined();
  });
});
