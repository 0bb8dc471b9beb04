import { coneIndex } from '../firing/cone.ts';
import { median } from '../numeric/summary.ts';
import type { WitnessReading } from './archive.ts';
import { counted, listed } from './found-text.ts';
import { grouped } from './grouped.ts';
import type { KilnAccount, KilnFiring, KilnReading } from './kiln-account.ts';
import { farthest, printed, type OddThing } from './odd-words.ts';

/** Over its whole history a kiln may wander by the step to which cones are read. */
const READ_TO_CONES = 0.25;
/** A reading so far from the set cone is another firing than was meant. */
const FAR_FROM_SET_CONES = 0.75;
/** No kiln is so uneven from shelf to shelf. */
const FAR_FROM_LOAD_CONES = 1.5;

/**
 * Kilns that move from firing to firing by more than cones are read to.
 *
 * @param kilns - accounts of the kilns
 * @returns a sentence a kiln
 *
 * Source of the limit: common practice, no source.
 */
export function driftingKilns(kilns: readonly KilnAccount[]): string[] {
  return kilns.flatMap(({ kiln, trend, firings, isDated }) => {
    if (trend === null || kiln === null) return [];
    const perFiring = Math.abs(trend.conesPerFiring);
    if (perFiring * (firings.length - 1) <= READ_TO_CONES) return [];
    const cooler = trend.conesPerFiring < 0;
    const read = trend.firings === firings.length ? '' : `, ${trend.firings} of them read`;
    const order = isDated ? '' : ', taken by name for want of dates';
    const why = cooler ? 'elements may be wearing' : 'look at the controller and the thermocouple';
    return [
      `${printed(kiln)} reads ${perFiring.toFixed(2)} cone ${cooler ? 'cooler' : 'warmer'} each ` +
        `firing (${counted(firings.length, 'firing')}${read}${order}): ${why}`,
    ];
  });
}

/**
 * Loads that came out far from the cone that their kiln was set to.
 *
 * @param kilns - accounts of the kilns
 * @returns one sentence, or none
 *
 * Source of the limit: common practice, no source.
 */
export function farFromSet(kilns: readonly KilnAccount[]): string[] {
  const far = kilns.flatMap(({ firings }) => firings.flatMap(offSet));
  return far.length === 0 ? [] : [`loads far from the cone they were set to: ${farthest(far)}`];
}

function offSet({ firing, setCone, lessSet }: KilnFiring): OddThing[] {
  if (lessSet === null || !isFarFromSet(lessSet)) return [];
  const by = Math.abs(lessSet);
  const side = lessSet < 0 ? 'below' : 'above';
  return [
    {
      words: `${printed(firing)} (set to ${setCone ?? ''}, reads ${by.toFixed(2)} cone ${side})`,
      by,
    },
  ];
}

function isFarFromSet(lessSet: number | null): boolean {
  return lessSet !== null && Math.abs(lessSet) >= FAR_FROM_SET_CONES;
}

/** The witness cones of one load. */
type LoadRead = Pick<KilnFiring, 'firing' | 'setCone' | 'readings' | 'lessSet'>;

/**
 * Witness cones that do not go with the others of their load, or with its set cone where the rest does.
 *
 * @param kilns - accounts of the kilns
 * @param witness - witness cones; they count where there is no firings.csv, so that no kiln is known
 * @returns one sentence, or none
 *
 * Source of the limit: common practice, no source.
 */
export function wildReadings(
  kilns: readonly KilnAccount[],
  witness: readonly WitnessReading[],
): string[] {
  const loads = kilns.length > 0 ? kilns.flatMap(({ firings }) => firings) : labelled(witness);
  const wild = loads.flatMap(wildOf);
  if (wild.length === 0) return [];
  return [`witness cones unlike the others of their load: ${farthest(wild)}`];
}

function labelled(witness: readonly WitnessReading[]): LoadRead[] {
  return [...grouped(witness, ({ firing }) => firing)].map(([firing, readings]) => {
    return { firing, readings, setCone: null, lessSet: null };
  });
}

function wildOf({ firing, setCone, readings, lessSet }: LoadRead): OddThing[] {
  // One alone against its set cone is a load far from it.
  if (readings.length < 2) return [];
  const set = setCone === null ? undefined : coneIndex(setCone);
  const indices = readings.map(({ coneIndex: index }) => index);
  const middle = median(set === undefined ? indices : [...indices, set]);
  const off = ({ coneIndex: index }: KilnReading) => {
    const offSetCone = set === undefined || isFarFromSet(lessSet) ? 0 : Math.abs(index - set);
    return Math.max(Math.abs(index - middle), offSetCone);
  };
  const isWild = (reading: KilnReading) => off(reading) > FAR_FROM_LOAD_CONES;
  const wild = readings.filter(isWild);
  if (wild.length === 0) return [];
  const rest = readings.filter((reading) => !isWild(reading));
  const others = rest.length > 0 ? readWords(rest) : '';
  const against = others === '' ? '' : ` against ${others}`;
  const words = `${printed(firing)} (${readWords(wild)}${against})`;
  return [{ words, by: Math.max(...wild.map(off)) }];
}

/** By cone, cool to hot, so that the order of rows makes no difference. */
function readWords(readings: readonly KilnReading[]): string {
  const each = readings.map(({ shelf, cone }) => `${printed(shelf ?? 'whole load')} ${cone}`);
  return listed(each.toSorted(), 'and');
}
