import { Command } from 'commander';
import { conesOf } from '../cone-options.ts';
import { helpText } from '../help-text.ts';
import type { Io } from '../io.ts';
import { lookOf } from '../look.ts';
import { modelAt } from '../model-input.ts';
import { somePoints, withPointOptions, type PointOptions } from '../point-options.ts';
import { tellNotes } from '../report-error.ts';

const HELP = `
Name the glaze by --glaze, --points or --recipe, or by several of them. MODEL
stands before --cone, --glaze and --recipe, which take every word after them.

Example:
  coneshift predict model.json --cone 5 6 --glaze \\
    "SiO2=3.4 Al2O3=0.42 B2O3=0.15 K2O=0.1 Na2O=0.15 CaO=0.75"`;

interface PredictFlags extends PointOptions {
  readonly cone: readonly string[];
  readonly json?: boolean;
}

/** `coneshift predict`: surface probabilities of every glaze at one or more cones. */
export const predictCommand = (io: Io): Command =>
  withPointOptions(
    new Command('predict')
      .description('chance of each surface at one or more cones, and the nearest tiles')
      .argument('<model>', 'model file written by fit, - for stdin'),
  )
    .requiredOption('-c, --cone <cone...>', 'cones to answer for, such as 6, 06 or 5.5')
    .option('--json', 'write JSON instead of a page')
    .addHelpText('after', () => helpText(HELP, io.columns))
    .action(async (path: string, flags: PredictFlags) => {
      const { jsonPieces, predict, predictEach, predictionPage } = await import('../../index.ts');
      const cones = await conesOf(flags.cone);
      const model = await modelAt(path, io);
      const { points, notes } = await somePoints(flags, { model, path }, io);
      await tellNotes(notes, io);
      if (flags.json) {
        const answers = predictEach(model, points, cones);
        for (const piece of jsonPieces({ ...answers, notes })) io.out(piece);
        return;
      }
      io.out(predictionPage(predict(model, points, cones), points, lookOf(io)));
    });
