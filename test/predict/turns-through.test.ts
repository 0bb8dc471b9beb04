import { expect, it } from 'vitest';
import { fitUnvalidated } from '../../src/model/fit.ts';
import { SURFACES, type Surface } from '../../src/model/model.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { normalTable, pathDraws } from '../../src/predict/path-draws.ts';
import { shift } from '../../src/predict/shift.ts';
import { anArchive } from '../support/builders.ts';
import { drawnUnity, inventedTiles } from '../support/invented-tiles.ts';

const model = fitUnvalidated(anArchive(inventedTiles({ tiles: 80, seed: 31 })));
const cones = Array.from({ length: 81 }, (_, i) => 4 + i / 20);

it('a draw that turns over the third surface inside the range leaves no end of the interval open', () => {
  const source = seededGenerator(3);
  for (let glaze = 0; glaze < 12; glaze++) {
    const unity = drawnUnity(source);
    const path = cones.map((coneIndex) => ({ unity, coneIndex }));
    const rows = (['melt', 'gloss'] as const).map((stage) => {
      const draws = pathDraws(model[stage], path, normalTable(stage));
      return Array.from({ length: draws.count }, (_, d) => [...draws.logOdds(d)]);
    });
    const paths = rows[0].map((melt, d) =>
      melt.map((value, i): Surface => {
        const [m, g] = [sigmoid(value), sigmoid(rows[1][d][i])];
        const p = { underfired: 1 - m, matte: m * (1 - g), gloss: m * g };
        return SURFACES.reduce<Surface>((a, b) => (p[b] > p[a] ? b : a), 'underfired');
      }),
    );
    for (const turn of shift(model, [{ point: 'P', unity }], [5, 6, 7]).points[0].turns) {
      const at = Math.round((turn.coneIndex - 4) * 20);
      const turning = paths.filter((path) =>
        path.some((s, i) => i > 0 && path[i - 1] === turn.from && s === turn.to),
      ).length;
      const beyond = paths.filter((path) => path.slice(at).every((s) => s === turn.from)).length;
      const below = paths.filter((path) =>
        path.slice(0, at + 1).every((s) => s === turn.to),
      ).length;
      const all = turning + beyond + below;
      if (Math.abs(beyond / all - 0.05) > 0.01) {
        expect(turn.interval90[1] === null).toBe(beyond / all > 0.05);
      }
      if (Math.abs(below / all - 0.05) > 0.01) {
        expect(turn.interval90[0] === null).toBe(below / all > 0.05);
      }
    }
  }
});
