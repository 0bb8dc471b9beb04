import type { LoadEffect, Model, Stage } from '../model/model.ts';
import { fixed, signed } from './figures.ts';
import { point, prose, type Look, type Section } from './page.ts';
import { printable } from './printable.ts';
import { countOf } from './sentences.ts';

/** 5 to 95 % of a Gaussian: so many sds to either side. */
const SDS_OF_90_PERCENT = 1.645;
/** Of loads that do not differ at all, so many stand out by chance: at most one in ten. */
const CHANCE_SHARE = 0.1;
/** With less log-odds to the cone an effect cannot be told in cones. */
const LEAST_HEAT_WEIGHT = 0.3;

/**
 * The loads whose tiles came out unlike those of the other loads, for the page of `fit`.
 *
 * @param model - fitted model
 * @param look - width and marking
 * @returns one section; it says so if no load stands out
 */
export function loadSection({ melt, gloss }: Pick<Model, 'melt' | 'gloss'>, look: Look): Section {
  const heading = 'Loads that stand out';
  const count = melt.loads.length;
  if (count < 2) return { heading, lines: [] };
  const words = [
    ...melt.loads.filter(standsOut).map((load) => meltWords(load, melt)),
    ...gloss.loads.filter(standsOut).map(glossWords),
  ];
  if (words.length === 0) return { heading, lines: [prose('None.', look)] };
  const chance = Math.max(1, Math.round(2 * CHANCE_SHARE * count));
  const caution =
    `Of ${countOf(count, 'load')} up to ${chance} may stand out by chance (melting and gloss counted). ` +
    'Look at the witness cones, the weighing and the verdicts of such a load.';
  return { heading, lines: [...words.map((one) => point(one, look)), prose(caution, look)] };
}

function standsOut({ mean, sd }: LoadEffect): boolean {
  return Math.abs(mean) > SDS_OF_90_PERCENT * sd;
}

function meltWords({ load, tiles, mean, sd }: LoadEffect, melt: Stage): string {
  const heat = melt.mean[melt.columns.indexOf('heat')] ?? 0;
  const side = mean < 0 ? 'less' : 'more';
  const odds = `log-odds ${signed(mean, 1)}, sd ${fixed(sd, 1)}`;
  const cones =
    heat < LEAST_HEAT_WEIGHT
      ? ''
      : `, as if fired about ${fixed(Math.abs(mean) / heat, 1)} cone ${mean < 0 ? 'cooler' : 'hotter'}`;
  return `${printable(load)} (${countOf(tiles, 'tile')}): melted ${side} than its cone says${cones} (${odds})`;
}

function glossWords({ load, tiles, mean, sd }: LoadEffect): string {
  const side = mean < 0 ? 'more matte' : 'more gloss';
  const odds = `log-odds ${signed(mean, 1)}, sd ${fixed(sd, 1)}`;
  return `${printable(load)} (${countOf(tiles, 'melted tile')}): ${side} than the other loads (${odds})`;
}
