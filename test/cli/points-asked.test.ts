import { beforeAll, describe, expect, it } from 'vitest';
import { run } from '../../src/cli/run.ts';
import { fitModel } from '../../src/model/fit.ts';
import { modelText } from '../../src/model/model-file.ts';
import { anArchive, aTile } from '../support/builders.ts';
import { fakeIo } from '../support/fake-io.ts';

const CLEAR = 'SiO2=3.4 Al2O3=0.42 B2O3=0.15 K2O=0.25 CaO=0.75';
const POINTS = 'point,SiO2,Al2O3,B2O3,K2O,CaO,Lead,colour\nP0,3.4,0.42,0.15,0.25,0.75,1,red\n';
const WEIGHTS = 'SiO2=64 Al2O3=13.4 B2O3=3.3 K2O=3 Na2O=2.9 CaO=13.4';
const UNUSED = 'p.csv: columns "Lead" and "colour" not known, not used';

const files: Record<string, string> = { 'p.csv': POINTS };
beforeAll(() => {
  files['m.json'] = modelText(fitModel(anArchive([aTile({ tile: 'A', firing: 'F1' })])));
});

async function called(...argv: readonly string[]) {
  const io = fakeIo({ files });
  return { exitCode: await run(argv, io), out: io.stdout(), err: io.stderr().replace(/\s+/g, ' ') };
}

describe('what is to be said of the glazes asked about', () => {
  it.each(['predict', 'shift', 'boundaries'])(
    '%s says once on stderr which columns it did not use, and in the JSON',
    async (command) => {
      const argv = [command, 'm.json', '--cone', '6', '--points', 'p.csv'];
      const page = await called(...argv);
      expect(page.exitCode).toBe(0);
      expect(page.err.split(UNUSED)).toHaveLength(2);
      expect(page.out).not.toContain('Lead');
      const { out } = await called(...argv, '--json');
      const { notes } = JSON.parse(out) as { notes: string[] };
      expect(notes.filter((note) => note === UNUSED)).toHaveLength(1);
    },
  );

  it('nothing is said where there is nothing to say', async () => {
    const { err, out } = await called(
      'predict',
      'm.json',
      '--cone',
      '6',
      '--glaze',
      CLEAR,
      '--json',
    );
    expect([err, (JSON.parse(out) as { notes: string[] }).notes]).toEqual(['', []]);
  });

  it('weight per cent in the place of moles is pointed out, read both ways', async () => {
    const { exitCode, err } = await called('predict', 'm.json', '--cone', '6', '--glaze', WEIGHTS);
    expect(exitCode).toBe(0);
    expect(err).toMatch(/read as moles: SiO2 3\.32.*if these are weight per cent .* SiO2 3\.35/);
  });
});

describe('words of the command line that name no glaze', () => {
  it.each([
    ['--glaze', 'sio2=3'],
    ['--glaze', 'SiO2=3,4 Al2O3=0.4 CaO=1'],
    ['--recipe', 'Nowhere'],
  ])('%s %s is a fault of usage, as a bad cone is', async (option, word) => {
    const { exitCode, out } = await called('predict', 'm.json', '--cone', '6', option, word);
    expect([exitCode, out]).toEqual([2, '']);
    expect((await called('predict', 'm.json', '--glaze', CLEAR, '--cone', 'x')).exitCode).toBe(2);
  });

  it('are all told at once', async () => {
    const argv = ['predict', 'm.json', '--cone', '6', '--glaze', 'sio2=3', CLEAR, 'K2O=x'];
    const { exitCode, err } = await called(...argv);
    expect(exitCode).toBe(2);
    expect(err).toContain('"sio2=3" is no composition');
    expect(err).toContain('"K2O=x" is no composition');
    expect(err.match(/Write moles of oxides/g)).toHaveLength(1);
  });

  it('what a file holds is not one of usage', async () => {
    files['bad.csv'] = 'point,SiO2,Al2O3,CaO\nA,x,0.4,1\n';
    const { exitCode } = await called('predict', 'm.json', '--cone', '6', '--points', 'bad.csv');
    expect(exitCode).toBe(3);
  });
});

describe('a MODEL that an option took for one of its own words', () => {
  it.each([
    [
      ['predict', '--cone', '6', 'm.json', '--glaze', CLEAR],
      '--cone',
      'predict m.json --cone 6 --glaze',
    ],
    [['shift', '--recipe', 'Slate Hen', 'm.json'], '--recipe', 'shift m.json --recipe "Slate Hen"'],
    [['boundaries', '-c', '5', '6', 'm'], '-c', 'boundaries m -c 5 6'],
  ])('%j is told where MODEL stands', async (argv, option, call) => {
    const { exitCode, err } = await called(...argv);
    expect(exitCode).toBe(2);
    expect(err).toContain("missing required argument 'model'");
    expect(err).toContain(
      `MODEL stands before ${option}, which takes every word after it: coneshift ${call}`,
    );
  });

  it('is not suspected where no option took two words', async () => {
    const { exitCode, err } = await called('predict', '--cone', '6');
    expect(exitCode).toBe(2);
    expect(err).not.toContain('stands before');
  });
});
