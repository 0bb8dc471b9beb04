import { readFileSync } from 'node:fs';
import { SourceMap, type SourceMapPayload } from 'node:module';
import { fileURLToPath } from 'node:url';

const PLACE = /(file:\/\/[^\s()]+?\.js):(\d+):(\d+)/g;

/**
 * A stack as it would be without bundling: the places of the sources, where a map tells them.
 *
 * Only a bug asks for it: to have every start of the program read the maps would slow all commands.
 *
 * @param stack - of an error
 * @returns the same lines; places without a map stay as they are
 */
export function mappedStack(stack: string): string {
  const maps = new Map<string, SourceMap | undefined>();
  return stack.replace(PLACE, (place, url: string, line: string, column: string) => {
    if (!maps.has(url)) maps.set(url, mapBeside(url));
    const entry = maps.get(url)?.findEntry(Number(line) - 1, Number(column) - 1);
    if (entry === undefined || !('originalSource' in entry)) return place;
    const source = fileURLToPath(new URL(entry.originalSource, url));
    return `${source}:${entry.originalLine + 1}:${entry.originalColumn + 1}`;
  });
}

function mapBeside(url: string): SourceMap | undefined {
  try {
    const text = readFileSync(new URL(`${url}.map`), 'utf8');
    return new SourceMap(JSON.parse(text) as SourceMapPayload);
  } catch {
    return undefined;
  }
}
