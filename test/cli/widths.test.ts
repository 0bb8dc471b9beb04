import { beforeAll, describe, expect, it } from 'vitest';
import { run } from '../../src/cli/run.ts';
import { textWidth } from '../../src/render/printable.ts';
import { demoFiles } from '../support/demo-archive.ts';
import { fakeIo } from '../support/fake-io.ts';

const GLAZE =
  'SiO2=3.4 Al2O3=0.42 B2O3=0.15 PbO=0.1 BaO=0.1 CuO=0.1 MnO=0.1 CoO=0.1 NiO=0.1 CaO=0.75';
const LONG = 'x'.repeat(190);
const POINTS = `point,SiO2,Al2O3,B2O3,CaO,colour\nA ${LONG} 1,3.4,0.42,0.15,1,red\n${LONG},66,14,2,20,\n`;
const CALLS: readonly (readonly string[])[] = [
  ['fit', 'demo', '--detail'],
  ['shift', 'model.json', '--recipe', 'Bellringer', '--cone', '5', '6', '05.5', '10'],
  ['shift', 'model.json', '--glaze', GLAZE],
  ['predict', 'model.json', '--cone', '5', '6', '--points', 'points.csv'],
  // Far too stiff to melt: the whole lines are underfired.
  ['boundaries', 'model.json', '--cone', '022', '5', '6', '7'],
  ['boundaries', 'model.json', '--glaze', 'SiO2=9 Al2O3=1.4 CaO=1'],
  ['unity', 'demo'],
  ['fit', 'faulty', '--leave-out-faulty'],
  ['unity', 'demo', 'Nowhere'],
  ['predict', 'model.json', '--cone', '6', '--glaze', 'sio2=3,4 CaO=x'],
];
/** The loads of a kiln are a table of its own width, for terminals of 80 columns and more. */
const WIDE_CALLS: readonly (readonly string[])[] = [['check', 'demo']];
const FAULTY =
  'tile,cone,firing,surface,SiO2,Al2O3,B2O3,K2O,CaO\nA,6,,gloss,3,0.4,0,0.3,0.7\n' +
  'B,a cone of which nobody has ever heard and that takes a whole line and more of it,,gloss,3,0.4,,0.3,x\n';

describe('every page fits its terminal', () => {
  const files: Record<string, string | Uint8Array> = {
    ...demoFiles(),
    'points.csv': POINTS,
    'faulty/tiles.csv': FAULTY,
  };

  beforeAll(async () => {
    const io = fakeIo({ files });
    expect(await run(['fit', 'demo', '--out', 'model.json'], io)).toBe(0);
    files['model.json'] = io.written.get('model.json') ?? '';
  });

  async function tooWide(argv: readonly string[], columns: number) {
    const io = fakeIo({ files, columns });
    expect(await run(argv, io)).toBeLessThan(4);
    expect(io.stderr()).not.toContain('bug');
    const lines = `${io.stdout()}\n${io.stderr()}`.split('\n');
    expect(lines.length).toBeGreaterThan(2);
    // A name without a space that is itself wider than the line cannot be broken.
    return lines.filter((line) => textWidth(line) > columns && !line.includes('xxxx'));
  }

  it.each(CALLS)('coneshift %s %s', async (...argv) => {
    for (const columns of [60, 80, 120]) expect(await tooWide(argv, columns)).toEqual([]);
  });

  it.each(WIDE_CALLS)('coneshift %s %s', async (...argv) => {
    for (const columns of [60, 80, 120]) expect(await tooWide(argv, columns)).toEqual([]);
  });

  it('as does the help', async () => {
    const commands = ['check', 'fit', 'predict', 'shift', 'boundaries', 'unity'];
    for (const argv of [['--help'], ...commands.map((command) => [command, '--help'])]) {
      const io = fakeIo({ columns: 60 });
      expect(await run(argv, io)).toBe(0);
      const [words = ''] = io.stdout().split('Example:');
      expect(words.split('\n').filter((line) => line.length > 60)).toEqual([]);
    }
  });

  it('as does what is said of a bug, but for its stack', async () => {
    const io = fakeIo({ files, columns: 60 });
    const broken = { ...io, kindOf: () => Promise.reject(new TypeError('x')) };
    expect(await run(['check', 'demo'], broken)).toBe(1);
    const [words = ''] = io.stderr().split('TypeError');
    expect(words.split('\n').filter((line) => line.length > 60)).toEqual([]);
  });
});
