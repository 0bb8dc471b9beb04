import { Command } from 'commander';
import { conesOf, USUAL_CONES } from '../cone-options.ts';
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
  coneshift shift model.json --recipe Bellringer "Slate Hen" --cone 5 6 7`;

interface ShiftFlags extends PointOptions {
  readonly cone?: readonly string[];
  readonly json?: boolean;
}

/** `coneshift shift`: how every glaze moves between cones, and where its surface turns. */
export const shiftCommand = (io: Io): Command =>
  withPointOptions(
    new Command('shift')
      .description('how a glaze moves between cones; where its surface turns')
      .argument('<model>', 'model file written by fit, - for stdin'),
  )
    .option('-c, --cone <cone...>', 'cones to answer for (5 6 7 if not given)')
    .option('--json', 'write JSON instead of a page')
    .addHelpText('after', () => helpText(HELP, io.columns))
    .action(async (path: string, flags: ShiftFlags) => {
      const { shift, shiftPage, toJson } = await import('../../index.ts');
      const cones = await conesOf(flags.cone ?? USUAL_CONES);
      const model = await modelAt(path, io);
      const { points, notes } = await somePoints(flags, { model, path }, io);
      const answers = shift(model, points, cones);
      await tellNotes(notes, io);
      io.out(flags.json ? toJson({ ...answers, notes }) : shiftPage(answers, lookOf(io)));
    });
