/** Options that take every word up to the next option. */
const TAKES_ALL = new Set(['--cone', '-c', '--glaze', '--recipe']);

/**
 * What to say where a command misses its MODEL because an option took it for one of its own words.
 *
 * @param argv - words of the command line
 * @returns a sentence, undefined where no option took more than one word
 */
export function swallowedModel(argv: readonly string[]): string | undefined {
  const [command = ''] = argv;
  for (const [at, option] of argv.entries()) {
    if (!TAKES_ALL.has(option)) continue;
    const next = argv.findIndex((word, i) => i > at && word.startsWith('-') && word !== '-');
    const taken = argv.slice(at + 1, next < 0 ? argv.length : next);
    const model = taken.find((word) => /\.json$/i.test(word)) ?? taken.at(-1);
    if (model === undefined || taken.length < 2) continue;
    const rest = argv.slice(1).filter((word) => word !== model);
    const call = ['coneshift', command, model, ...rest].map(inQuotes).join(' ');
    return `MODEL stands before ${option}, which takes every word after it: ${call}`;
  }
  return undefined;
}

function inQuotes(word: string): string {
  return /^[\w./:@%+=,-]+$/.test(word) ? word : JSON.stringify(word);
}
