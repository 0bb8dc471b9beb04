import { Command } from 'commander';
import { ArchiveError } from '../../errors.ts';
import type { ArchiveReading } from '../../index.ts';
import { archiveFilesAt } from '../archive-input.ts';
import type { Io } from '../io.ts';
import { lookOf } from '../look.ts';
import { modelIsWritable } from '../model-output.ts';
import { safeLines } from '../report-error.ts';

const HELP = `
Stops at any faulty row unless --leave-out-faulty is given; then those rows
count as refused. Nothing is written without --out.

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
    .addHelpText('after', HELP)
    .action(async (path: string, flags: FitFlags) => {
      const { out, json = false, detail = false } = flags;
      const { fitAnswer, fitModel, fitPage, modelText, readArchive, toJson } =
        await import('../../index.ts');
      if (out !== undefined) await modelIsWritable(out, io);
      const reading = readArchive(await archiveFilesAt(path, io));
      const { archive, faults } = reading;
      tellFaults(reading, flags, io);
      if (archive.counts.fitted >= MANY_TILES) {
        io.err(`Fitting ${archive.counts.fitted} tiles, anew for each part left out ...\n`);
      }
      const model = fitModel(archive, { madeBy: `coneshift ${io.version}` });
      if (out !== undefined) await io.writeFileWhole(out, modelText(model));
      const outcome = { model, leftOut: faults, writtenTo: out, detail };
      io.out(json ? toJson(fitAnswer(outcome)) : fitPage(outcome, lookOf(io)));
    });

/** Faulty rows stop the fit, or are named on the stream for messages: none goes in silence. */
function tellFaults(
  { archive, faults }: ArchiveReading,
  { leaveOutFaulty }: FitFlags,
  io: Io,
): void {
  if (faults.length === 0) return;
  if (leaveOutFaulty !== true) {
    throw new ArchiveError(
      faults,
      'Mend the files, or go on without the faulty rows by --leave-out-faulty.',
    );
  }
  const error = new ArchiveError(faults, 'No sound tile is left: mend the files first.');
  if (archive.tiles.length === 0) throw error;
  io.err(safeLines(`coneshift: left out, ${error.message}\n`));
}
