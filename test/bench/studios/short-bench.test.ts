// A shortened bench: few invented studios, fixed seeds, bounds that a broken model fails. The full tables
// come from `npm run bench:studios`. Everything here is invented and drawn in the test.
import { describe, expect, it } from 'vitest';
import { DEVELOPMENT_FAMILIES } from './families.ts';
import { trial, type LearnerTrial } from './trial.ts';

const seeds = Array.from({ length: 15 }, (_, i) => 9001 + i);
const mean = (values: readonly number[]) => values.reduce((a, b) => a + b, 0) / values.length;
const shareHeld = (trials: readonly LearnerTrial[]) =>
  mean(trials.flatMap(({ held }) => (held && held.cells > 0 ? [held.held / held.cells] : [])));

function trials(size: number, wrongShare?: number) {
  const both = seeds.map((seed) => {
    const family = DEVELOPMENT_FAMILIES[seed % DEVELOPMENT_FAMILIES.length];
    const asked = { family, seed, size, ...(wrongShare === undefined ? {} : { wrongShare }) };
    return trial(asked, ['start', 'current']).learners;
  });
  return { start: both.map(([own]) => own), current: both.map(([, own]) => own) };
}
const excessOf = (own: readonly LearnerTrial[]) => mean(own.map(({ excess }) => excess));

describe.each([100, 300])('fifteen invented studios of %d tiles', (size) => {
  const { start, current } = trials(size);

  it('are learned better than by the first model', () => {
    expect(excessOf(current) / excessOf(start)).toBeLessThan(0.95);
  });

  it('have their true probabilities in the 90 % intervals about 9 times in 10', () => {
    expect(shareHeld(current)).toBeGreaterThan(0.86);
    expect(shareHeld(current)).toBeLessThan(0.97);
  });
});

it('a twentieth of wrong verdicts costs at most a third at 300 tiles', () => {
  const [right, wrong] = [0, 0.05].map((share) => excessOf(trials(300, share).current));
  expect(wrong / right).toBeLessThan(4 / 3);
  expect(wrong).toBeGreaterThan(0.9 * right);
});
