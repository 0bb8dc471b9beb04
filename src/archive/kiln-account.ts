import { coneIndex } from '../firing/cone.ts';
import { median } from '../numeric/summary.ts';
import { theilSen } from '../numeric/trend.ts';
import type { Archive, Firing, WitnessReading } from './archive.ts';
import { grouped } from './grouped.ts';
import { byName, inNameOrder } from './name-order.ts';

/** A witness cone read in one load; without a shelf where it stands for the whole load. */
export interface KilnReading {
  readonly shelf: string | null;
  readonly cone: string;
  readonly coneIndex: number;
}

/** One load of a kiln, and what its witness cones say. */
export interface KilnFiring {
  readonly firing: string;
  readonly date: string | null;
  readonly setCone: string | null;
  /** That for the whole load first, then by shelf. */
  readonly readings: readonly KilnReading[];
  /** Median reading less the set cone, cones; null without either. */
  readonly lessSet: number | null;
}

/** How one shelf stands against the rest of its load. */
export interface ShelfAccount {
  readonly shelf: string;
  readonly readings: number;
  /** Median of (reading less the median of its load), cones. */
  readonly lessLoad: number;
}

/** How readings less set cone move from one firing of the kiln to the next. */
export interface KilnTrend {
  readonly conesPerFiring: number;
  /** Firings with a reading and a set cone. */
  readonly firings: number;
  /** Witness cones read in them. */
  readonly readings: number;
}

/** The history of one kiln. */
export interface KilnAccount {
  /** Null for firings that name no kiln. */
  readonly kiln: string | null;
  /** By date where all have one, else by name. */
  readonly firings: readonly KilnFiring[];
  /** False where a firing has no date, so that nothing but the names tells their order. */
  readonly isDated: boolean;
  /** Median of (reading less set cone), cones; null without readings. */
  readonly lessSet: number | null;
  /** The hottest first. */
  readonly shelves: readonly ShelfAccount[];
  /** Null with fewer than three firings read. */
  readonly trend: KilnTrend | null;
}

/** With two firings any wobble looks like a trend. */
const FEWEST_FOR_TREND = 3;
/** All pairs of a thousand readings are quick; of more, the latest tell how the kiln is now. */
const MOST_READINGS = 1000;

/**
 * What the witness cones tell of each kiln.
 *
 * The trend is the Theil-Sen slope of (reading less set cone), every shelf a reading, over the kiln's
 * firings, those without a reading counted: elements age in each of them. Of more than 1,000 readings
 * the latest count.
 *
 * @param archive - firings and witness cones
 * @returns kilns by name, firings without a kiln last
 */
export function kilnAccounts({
  firings,
  witness,
}: Pick<Archive, 'firings' | 'witness'>): KilnAccount[] {
  const read = grouped(witness, ({ firing }) => firing);
  const kilns = [...grouped(firings, ({ kiln }) => kiln ?? null)].map(([kiln, own]) =>
    kilnAccount(kiln, own, read),
  );
  const isNamed = ({ kiln }: KilnAccount) => kiln !== null;
  const named = inNameOrder(kilns.filter(isNamed), ({ kiln }) => kiln ?? '');
  return [...named, ...kilns.filter((account) => !isNamed(account))];
}

function kilnAccount(
  kiln: string | null,
  own: readonly Firing[],
  read: ReadonlyMap<string, readonly WitnessReading[]>,
): KilnAccount {
  const firings = inTime(own).map((firing) => kilnFiring(firing, read.get(firing.firing) ?? []));
  const offs = firings.flatMap(({ lessSet }) => (lessSet === null ? [] : [lessSet]));
  return {
    kiln,
    firings,
    isDated: firings.every(({ date }) => date !== null),
    lessSet: offs.length === 0 ? null : median(offs),
    shelves: shelfAccounts(firings),
    // Firings of several unnamed kilns are no history of one.
    trend: kiln === null ? null : trendOf(firings),
  };
}

function inTime(firings: readonly Firing[]): readonly Firing[] {
  const named = inNameOrder(firings, ({ firing }) => firing);
  if (firings.some(({ date }) => date === undefined)) return named;
  return named.sort((a, b) => (a.date! < b.date! ? -1 : Number(a.date! > b.date!)));
}

function kilnFiring(firing: Firing, onShelves: readonly WitnessReading[]): KilnFiring {
  const whole = firing.cone === undefined ? [] : [readingOf(null, firing.cone)];
  const shelves = inNameOrder(onShelves, ({ shelf }) => shelf).map(({ shelf, cone }) =>
    readingOf(shelf, cone),
  );
  const { date = null, setCone = null } = firing;
  const one = { firing: firing.firing, date, setCone, readings: [...whole, ...shelves] };
  const offs = offsOf(one);
  return { ...one, lessSet: offs.length === 0 ? null : median(offs) };
}

/**
 * Readings of a load less its set cone. Shelves are the fuller account: where they were read, the one
 * cone of firings.csv is taken for one of them.
 */
function offsOf({ setCone, readings }: Pick<KilnFiring, 'setCone' | 'readings'>): number[] {
  if (setCone === null) return [];
  const onShelves = readings.filter(({ shelf }) => shelf !== null);
  const counted = onShelves.length > 0 ? onShelves : readings;
  return counted.map(({ coneIndex: index }) => index - coneIndex(setCone));
}

function readingOf(shelf: string | null, cone: string): KilnReading {
  return { shelf, cone, coneIndex: coneIndex(cone) };
}

function shelfAccounts(firings: readonly KilnFiring[]): ShelfAccount[] {
  const placed = firings.flatMap(({ readings }) => {
    const onShelves = readings.filter(({ shelf }) => shelf !== null);
    // One shelf alone has nothing to stand against.
    if (onShelves.length < 2) return [];
    const middle = median(onShelves.map(({ coneIndex: index }) => index));
    return onShelves.map(({ shelf, coneIndex: index }) => ({ shelf: shelf!, off: index - middle }));
  });
  // 'Top' of one load and 'top' of another are one shelf, as they are for the tiles.
  const accounts = [...grouped(placed, ({ shelf }) => shelf.toLowerCase()).values()].map((own) => ({
    shelf: own.map(({ shelf }) => shelf).sort(byName)[0]!,
    readings: own.length,
    lessLoad: median(own.map(({ off }) => off)),
  }));
  return accounts.sort((a, b) => b.lessLoad - a.lessLoad || byName(a.shelf, b.shelf));
}

function trendOf(firings: readonly KilnFiring[]): KilnTrend | null {
  const all = firings.flatMap((firing, turn) => offsOf(firing).map((off) => ({ turn, off })));
  const read = all.slice(-MOST_READINGS);
  const turns = read.map(({ turn }) => turn);
  const count = new Set(turns).size;
  if (count < FEWEST_FOR_TREND) return null;
  const { slope } = theilSen(
    turns,
    read.map(({ off }) => off),
  );
  return { conesPerFiring: slope, firings: count, readings: read.length };
}
