import type { Fault } from '../errors.ts';
import { isOxide, OXIDES } from '../chemistry/oxides.ts';
import type { Table } from './csv-table.ts';
import { listed, quoted } from './found-text.ts';
import { LIMITS } from './limits.ts';
import { nearestNames, slips } from './nearest-name.ts';

/** Which column of a table holds what. */
export interface Headings {
  /** Place of each known column that the table has. */
  readonly places: ReadonlyMap<string, number>;
  /** Columns that are not known: kept, not read. */
  readonly unknown: readonly { readonly heading: string; readonly place: number }[];
  /** Known columns that faulty headings are nearest to: not missing, only misspelt. */
  readonly meant: ReadonlySet<string>;
  readonly faults: readonly Fault[];
  readonly notes: readonly string[];
}

/**
 * Finds the known columns of a table.
 *
 * A known name in other capitals, or with raised or lowered digits, is accepted with a note. A near
 * miss of a known name, or what looks like an oxide, is a fault: left aside in silence it would change
 * every composition.
 *
 * @param table - the table
 * @param known - the names it may have
 * @returns places, unknown columns, columns meant by faulty headings, faults and notes
 */
export function mapHeadings(table: Table, known: readonly string[]): Headings {
  const { file, headingLine: line } = table;
  const bySpelling = new Map(known.map((name) => [spelling(name), name]));
  const places = new Map<string, number>();
  const unknown: { heading: string; place: number }[] = [];
  const meant = new Set<string>();
  const faults: Fault[] = [];
  const notes: string[] = [];
  const seen = new Map<string, number>();
  for (const [place, heading] of table.headings.entries()) {
    if (heading === '') continue;
    const name = bySpelling.get(spelling(heading));
    const fault = (message: string) => {
      faults.push({ file, line, column: heading.slice(0, LIMITS.nameCharacters), message });
    };
    const first = seen.get(name ?? heading);
    seen.set(name ?? heading, first ?? place);
    if (first !== undefined) {
      fault(`expected each column once, got it in columns ${first + 1} and ${place + 1}`);
    } else if (name !== undefined) {
      places.set(name, place);
      if (name !== heading) notes.push(`${file}: heading ${quoted(heading)} read as ${name}`);
    } else {
      const problem = headingProblem(heading, known);
      if (problem === undefined) unknown.push({ heading, place });
      else fault(problem.message);
      for (const column of problem?.nearest ?? []) meant.add(column);
    }
  }
  return { places, unknown, meant, faults, notes };
}

function spelling(heading: string): string {
  return heading.normalize('NFKC').toLowerCase();
}

interface HeadingProblem {
  readonly message: string;
  readonly nearest: readonly string[];
}

function headingProblem(heading: string, known: readonly string[]): HeadingProblem | undefined {
  if (heading.length > LIMITS.nameCharacters) {
    const message = `expected a heading of at most ${LIMITS.nameCharacters} characters, got ${heading.length}`;
    return { message, nearest: [] };
  }
  const misnamed = (what: string, nearest: readonly string[]) => ({
    message: `expected ${what}, got ${quoted(heading)}; nearest known: ${listed(nearest)}`,
    nearest,
  });
  const oxide = known.some(isOxide) ? nearestOxides(heading, known) : [];
  if (oxide.length > 0) return misnamed('an oxide that is known', oxide);
  const missed = nearestNames(heading, known).filter((name) => isNearMiss(heading, name));
  return missed.length === 0 ? undefined : misnamed('a known column', missed);
}

/**
 * Whether a word is a known name but for a slip.
 *
 * One slip in a short name, two in a longer one: `notes`, `surfce`, `set cone`, `Si02`, `A12O3`. A word
 * without a digit is no slip of an oxide: `No.` is not NiO.
 *
 * @param heading - the word
 * @param name - a known name
 * @returns true if it is
 */
export function isNearMiss(heading: string, name: string): boolean {
  if (isOxide(name)) return /\d/.test(heading) && slips(heading, name) <= (name.length < 5 ? 1 : 2);
  return slips(heading, name) <= (name.length <= 5 ? 1 : 2);
}

/** What analyses list beside the oxides that stay in the glaze. */
const LOST_IN_FIRING = new Set(['H2O', 'CO2']);

/**
 * An element and oxygen, alone or with a unit behind it ('SiO2 %'), or a sum of oxides (KNaO, RO).
 * A ratio such as 'SiO2:Al2O3' is none, nor a word in capitals without a digit ('NO').
 */
const LOOKS_LIKE_AN_OXIDE =
  /^((?:[A-Z][a-z]?\d*O\d)|(?:[A-Z][a-z]?\dO)|(?:[A-Z][a-z]O)|(?:[A-Z][a-z]?){2}O|RO)(?![A-Za-z0-9:/])(?!\s*[:/])/;

/** The nearest known oxides of what looks like one, the same element first; else none. */
function nearestOxides(heading: string, known: readonly string[]): readonly string[] {
  const found = LOOKS_LIKE_AN_OXIDE.exec(heading.normalize('NFKC'))?.[1];
  if (found === undefined) return [];
  if (LOST_IN_FIRING.has(found) && known.includes('loi')) return ['loi'];
  const element = /^[A-Z][a-z]?/.exec(found)?.[0] ?? '';
  const ofElement = OXIDES.filter((oxide) => new RegExp(`^${element}\\d?O`).test(oxide));
  return nearestNames(found, ofElement.length > 0 ? ofElement : OXIDES);
}
