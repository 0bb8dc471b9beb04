import { expect, it } from 'vitest';
import { run } from '../../src/cli/run.ts';
import { fakeIo } from '../support/fake-io.ts';

it.each(['shift', 'predict', 'boundaries'])(
  '%s with a blank --cone is a usage error',
  async (command) => {
    for (const blank of ['', ',', ' ']) {
      const io = fakeIo({});
      expect(await run([command, 'model.json', '--cone', blank], io)).toBe(2);
      expect(io.stderr()).toContain('expected at least one cone after --cone, got none');
      expect(io.stderr()).not.toContain('bug');
      expect(io.stdout()).toBe('');
    }
  },
);
