import { Command, CommanderError } from 'commander';
import { boundariesCommand } from './commands/boundaries.ts';
import { checkCommand } from './commands/check.ts';
import { fitCommand } from './commands/fit.ts';
import { predictCommand } from './commands/predict.ts';
import { shiftCommand } from './commands/shift.ts';
import { unityCommand } from './commands/unity.ts';
import type { Io } from './io.ts';
import { helpText, LEAST_HELP_COLUMNS } from './help-text.ts';
import { reportError, safeLines, tell } from './report-error.ts';
import { swallowedModel } from './swallowed-model.ts';

/** Exit code of a call that cannot be understood. */
const USAGE = 2;

/**
 * Runs the command line.
 *
 * @param argv - arguments after the program's name
 * @param io - what it may touch
 * @returns exit code: 0 done, 1 a bug, 2 usage, 3 a file that cannot be read or written,
 *   4 cannot be fitted or solved
 */
export async function run(argv: readonly string[], io: Io): Promise<number> {
  try {
    await program(io).parseAsync([...argv], { from: 'user' });
    return 0;
  } catch (error) {
    // Commander has said by now what it did not understand, or has shown the help asked for.
    if (error instanceof CommanderError) {
      const isMissing = error.code === 'commander.missingArgument';
      const hint = isMissing ? swallowedModel(argv) : undefined;
      if (hint !== undefined) await tell(hint, io);
      return error.exitCode === 0 ? 0 : USAGE;
    }
    return await reportError(error, io);
  }
}

const ABOUT = `Learns from a studio's judged test tiles where matte, gloss and underfired lie at each
cone, and says how a glaze shifts between cones, and how surely.`;

const EXAMPLE = `
ARCHIVE is a folder of CSV files (tiles.csv and what is beside it), one CSV
file, or - for one CSV on standard input. MODEL is a file written by fit, or -
for standard input.

Exit codes: 0 done; 1 a bug; 2 usage: a word of the command line cannot be
meant (an option, a cone, a glaze, the name of a recipe, a file that must not
be written over); 3 a file or folder that cannot be read or written, or has
faults; 4 cannot be fitted or solved.

Example:
  coneshift check my-tiles/
  coneshift fit my-tiles/ --out model.json
  coneshift shift model.json --recipe "Slate Hen" --cone 5 6 7`;

function program(io: Io): Command {
  const root = new Command('coneshift')
    .description(ABOUT.replace(/\n/g, ' '))
    .version(io.version, '-V, --version', 'show the version')
    .helpOption('-h, --help', 'show this help')
    .helpCommand('help [command]', 'show the help of a command')
    .addHelpText('after', () => helpText(EXAMPLE, io.columns))
    .configureHelp({ subcommandTerm: (command) => command.name(), minWidthToWrap: 20 })
    .exitOverride()
    .showHelpAfterError('Add --help to see what it takes.')
    .configureOutput({
      writeOut: io.out,
      writeErr: (text) => {
        io.err(safeLines(text));
      },
      getOutHelpWidth: () => Math.max(LEAST_HELP_COLUMNS, io.columns),
      getErrHelpWidth: () => Math.max(LEAST_HELP_COLUMNS, io.columns),
    });
  const commands = [
    checkCommand,
    fitCommand,
    predictCommand,
    shiftCommand,
    boundariesCommand,
    unityCommand,
  ];
  for (const command of commands) root.addCommand(command(io).copyInheritedSettings(root));
  return root;
}
