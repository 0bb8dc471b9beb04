import { Command } from 'commander';
import { UsageError } from '../../errors.ts';
import { conesOf, USUAL_CONES } from '../cone-options.ts';
import { helpText } from '../help-text.ts';
import type { Io } from '../io.ts';
import { lookOf } from '../look.ts';
import { modelAt } from '../model-input.ts';
import { pointsOf, withPointOptions, type PointOptions } from '../point-options.ts';
import { tellNotes } from '../report-error.ts';

const HELP = `
The lines run through the middle of the archive, or through the one glaze that
--glaze, --points or --recipe names: along alumina, along silica, and along
SiO2:Al2O3 with their sum held. MODEL stands before --cone, --glaze and
--recipe, which take every word after them.

Example:
  coneshift boundaries model.json --cone 5 6 7 --recipe Bellringer`;

interface BoundariesFlags extends PointOptions {
  readonly cone?: readonly string[];
  readonly json?: boolean;
}

/** `coneshift boundaries`: where the boundaries lie along alumina and silica, and how surely. */
export const boundariesCommand = (io: Io): Command =>
  withPointOptions(
    new Command('boundaries')
      .description('where the boundaries lie along alumina and silica, and how surely')
      .argument('<model>', 'model file written by fit, - for stdin'),
  )
    .option('-c, --cone <cone...>', 'cones to answer for (5 6 7 if not given)')
    .option('--json', 'write JSON instead of a page')
    .addHelpText('after', () => helpText(HELP, io.columns))
    .action(async (path: string, flags: BoundariesFlags) => {
      const { boundaries, boundaryPage, toJson } = await import('../../index.ts');
      const cones = await conesOf(flags.cone ?? USUAL_CONES);
      const model = await modelAt(path, io);
      const { points, notes } = await pointsOf(flags, { model, path }, io);
      const [through, ...more] = points;
      if (more.length > 0) {
        throw new UsageError(
          `expected one glaze to run the lines through, got ${more.length + 1}`,
          'Ask for each of them in a call of its own.',
        );
      }
      const answers = boundaries(model, cones, through === undefined ? {} : { through });
      await tellNotes(notes, io);
      const whole = { ...answers, notes: [...notes, ...answers.notes] };
      io.out(flags.json ? toJson(whole) : boundaryPage(answers, lookOf(io)));
    });
