import type { FiringEffect, LoadEffect, MeanAndSd, Model } from '../model/model.ts';
import { fixed, signed } from './figures.ts';
import { point, prose, type Look, type Section } from './page.ts';
import { printable } from './printable.ts';
import { countOf } from './sentences.ts';

/** 5 to 95 % of a Gaussian: so many sds to either side. */
const SDS_OF_90_PERCENT = 1.645;
/** Of loads that do not differ at all, so many stand out by chance: at most one in ten. */
const CHANCE_SHARE = 0.1;

/**
 * The loads whose tiles came out unlike those of the other loads, for the page of `fit`.
 *
 * @param model - fitted model
 * @param look - width and marking
 * @returns one section; it says so if no load stands out
 */
export function loadSection(
  { loads, loadSpread }: Pick<Model, 'loads' | 'loadSpread'>,
  look: Look,
): Section {
  const heading = 'Loads that stand out';
  const count = loads.length;
  if (count < 2) return { heading, lines: [] };
  // Of a Student's t with 5 degrees of freedom 64 % lie within its scale.
  const spread =
    `About two loads in three lie within ${fixed(loadSpread.offsetScaleCones, 2)} cone of their cone ` +
    'on paper. An error that all loads share cannot be seen.';
  const words = [
    ...farthestFirst(loads, ({ offsetCones }) => offsetCones).map(heatWords),
    ...farthestFirst(loads, ({ glossLogOdds }) => glossLogOdds).map(glossWords),
  ];
  if (words.length === 0) return { heading, lines: [prose(`None. ${spread}`, look)] };
  const chance = Math.max(1, Math.round(2 * CHANCE_SHARE * count));
  const caution =
    `Of ${countOf(count, 'load')} up to ${chance} may stand out by chance (heat and gloss counted). ` +
    'Look at the witness cones, the weighing and the verdicts of such a load.';
  return {
    heading,
    lines: [...words.map((one) => point(one, look)), prose(`${spread} ${caution}`, look)],
  };
}

function farthestFirst(
  loads: readonly LoadEffect[],
  effect: (load: LoadEffect) => MeanAndSd,
): LoadEffect[] {
  const size = (load: LoadEffect) => Math.abs(effect(load).mean);
  return loads.filter((load) => standsOut(effect(load))).sort((a, b) => size(b) - size(a));
}

function standsOut({ mean, sd }: MeanAndSd): boolean {
  return Math.abs(mean) > SDS_OF_90_PERCENT * sd;
}

/**
 * What cooling and atmosphere do to gloss, for the page of `fit`.
 *
 * @param effects - of the model
 * @param look - width and marking
 * @returns one section; without lines where there is nothing to tell
 */
export function firingSection(effects: readonly FiringEffect[], look: Look): Section {
  const lines = effects.map((effect) => {
    const { mean, sd } = effect.gloss;
    const half = SDS_OF_90_PERCENT * sd;
    const [what, usual] =
      effect.column === 'cooling'
        ? ['cooling twice as fast', `cooling at ${fixed(effect.usualCPerH, 0)} °C/h`]
        : [effect.usual === 'oxidation' ? 'reduction' : 'oxidation', effect.usual];
    const side = standsOut(effect.gloss) ? '' : ' (may be nothing)';
    return point(
      `${what}: gloss log-odds ${signed(mean, 1)}, 90 % ${signed(mean - half, 1)} to ` +
        `${signed(mean + half, 1)}${side}. Answers are for ${usual}.`,
      look,
    );
  });
  return { heading: 'Cooling and atmosphere', lines };
}

function heatWords({ load, tiles, offsetCones: { mean, sd } }: LoadEffect): string {
  const side = mean < 0 ? 'cooler' : 'hotter';
  return (
    `${printable(load)} (${countOf(tiles, 'tile')}): as if fired ${fixed(Math.abs(mean), 1)} cone ` +
    `${side} than its cone on paper (sd ${fixed(sd, 1)})`
  );
}

function glossWords({ load, tiles, glossLogOdds: { mean, sd } }: LoadEffect): string {
  const side = mean < 0 ? 'more matte' : 'more gloss';
  const odds = `log-odds ${signed(mean, 1)}, sd ${fixed(sd, 1)}`;
  return `${printable(load)} (${countOf(tiles, 'tile')}): ${side} than its heat explains (${odds})`;
}
