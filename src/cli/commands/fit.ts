import { Command } from 'commander';
import { ArchiveError } from '../../errors.ts';
import type { ArchiveReading } from '../../index.ts';
import { archiveFilesAt } from '../archive-input.ts';
import { helpText } from '../help-text.ts';
import type { Io } from '../io.ts';
import { lookOf } from '../look.ts';
import { modelIsWritable } from '../model-output.ts';
import { tell } from '../report-error.ts';

const HELP = `
Stops at any faulty row unless --leave-out-faulty is given; then those rows
count as refused. Nothing is written without --out.

Exit code 2 if --out names a file that must not be written over, 3 if the
archive has faults or a file cannot be read or written. 4 is kept for what
cannot be fitted; any number of judged tiles can, none included: the model then
says what is usual elsewhere.

Example:
  coneshift fit datasets/demo-studio --out model.json`;

interface FitFlags {
  readonly out?: string;
  readonly leaveOutFaulty?: boolean;
  readonly detail?: boolean;
  readonly json?: boolean;
}

/** From so many tiles on the fit takes long enough to say so. */
const MANY_TILES = 1000;

/** `coneshift fit`: learn the boundaries, tell how well they hold. */
export const fitCommand = (io: Io): Command =>
  new Command('fit')
    .description('learn the boundaries; tell how well they hold on tiles left out')
    .argument('<archive>', 'folder of CSV files, one CSV file, or - for one CSV on stdin')
    .option('-o, --out <file>', 'write the model to this file, which other commands read')
    .option('--leave-out-faulty', 'go on without faulty rows')
    .option('--detail', 'show every load and glaze left out, and the sds of the weights')
    .option('--json', 'write JSON instead of a page')
    .addHelpText('after', () => helpText(HELP, io.columns))
    .action(async (path: string, flags: FitFlags) => {
      const { out, json = false, detail = false } = flags;
      const { compositionDoubts, fitAnswer, fitModel, fitPage, modelText, readArchive, toJson } =
        await import('../../index.ts');
      if (out !== undefined) await modelIsWritable(out, io);
      const reading = readArchive(await archiveFilesAt(path, io));
      const { archive, faults } = reading;
      await tellFaults(reading, flags, io);
      if (archive.counts.fitted >= MANY_TILES) {
        await tell(`Fitting ${archive.counts.fitted} tiles, anew for each group left out ...`, io);
      }
      const model = fitModel(archive, { madeBy: `coneshift ${io.version}` });
      if (out !== undefined) await io.writeFileWhole(out, modelText(model));
      const doubts = compositionDoubts(archive);
      const outcome = { model, leftOut: faults, writtenTo: out, detail, doubts };
      io.out(json ? toJson(fitAnswer(outcome)) : fitPage(outcome, lookOf(io)));
    });

/** Faulty rows stop the fit, or are named on the stream for messages: none goes in silence. */
async function tellFaults(reading: ArchiveReading, flags: FitFlags, io: Io): Promise<void> {
  const { archive, faults } = reading;
  if (faults.length === 0) return;
  const goesOn = flags.leaveOutFaulty === true && archive.tiles.length > 0;
  const hint =
    flags.leaveOutFaulty === true
      ? 'No sound tile is left: mend the files first.'
      : 'Mend the files, or go on without the faulty rows by --leave-out-faulty.';
  const error = new ArchiveError(faults, hint);
  if (goesOn) return tell(`coneshift: left out, ${error.message}`, io);
  if (flags.json === true) {
    const { toJson, unfittedAnswer } = await import('../../index.ts');
    io.out(toJson(unfittedAnswer(reading)));
  }
  throw error;
}
