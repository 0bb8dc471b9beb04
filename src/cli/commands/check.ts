import { Command } from 'commander';
import { archiveFilesAt } from '../archive-input.ts';
import { UnreadableError } from '../cli-errors.ts';
import { helpText } from '../help-text.ts';
import type { Io } from '../io.ts';
import { lookOf } from '../look.ts';

const HELP = `
Lists every fault as file:line column: expected, found. Exit code 3 if there is
any.

Example:
  coneshift check datasets/demo-studio`;

/** `coneshift check`: is the archive readable, what is in it, what looks odd. */
export const checkCommand = (io: Io): Command =>
  new Command('check')
    .description('is the archive readable; what is in it; what looks odd')
    .argument('<archive>', 'folder of CSV files, one CSV file, or - for one CSV on stdin')
    .option('--json', 'write JSON instead of a page')
    .addHelpText('after', () => helpText(HELP, io.columns))
    .action(async (path: string, { json = false }: { json?: boolean }) => {
      const { checkAnswer, checkPage, inventory, readArchive, toJson } =
        await import('../../index.ts');
      const reading = readArchive(await archiveFilesAt(path, io));
      const held = inventory(reading.archive);
      io.out(json ? toJson(checkAnswer(reading, held)) : checkPage(reading, held, lookOf(io)));
      const count = reading.faults.length;
      if (count > 0) {
        throw new UnreadableError(`${count} ${count === 1 ? 'fault' : 'faults'} in the archive`);
      }
    });
