import { quoted } from '../archive/found-text.ts';
import { shortened } from '../archive/odd-words.ts';
import { OXIDE_STEP } from '../chemistry/oxide-steps.ts';
import { OXIDES } from '../chemistry/oxides.ts';
import { coneText } from '../firing/cone.ts';
import { problemAt, STAGES, type StageName } from './design.ts';
import { foldsByCone } from './folds.ts';
import type { HeatCheck } from './heat-check.ts';
import type { JudgedTile } from './judged.ts';
import { hasColumn } from './inputs.ts';
import { blockLogOdds } from './latent.ts';
import type { Diagnostic, FiringEffect, Validation } from './model.ts';
import type { RisingFit } from './stages.ts';
import { unknownsAt } from './units.ts';

/** Fewer tiles than this on one side of a boundary leave it mostly to the prior. */
const FEW_TILES = 10;
/** Cones that the tool is asked about first. */
const MAIN_CONES = [5, 6, 7];
/** A tile within so many cones counts for a cone. */
const NEAR_CONE = 0.5;
/** A smaller fall of a probability is not seen on any page. */
const SEEN_FALL = 0.001;
/** Over a quarter of a cone chance hardly brings about so large a fall. */
const CONTRARY_FALL = 0.05;
/** In sds. Usual are 0.3 to 1, whatever the archive. */
const DOUBTFUL_SHIFT = 2;
/** Of fewer tiles on a side it is no wonder that they stand clear. */
const TELLING_SIDE = 3;
/** An oxide in fewer of the tiles hardly bears on the whole. */
const COMMON_SHARE = 0.1;
/** What a fit is examined with. */
export interface Examined {
  readonly tiles: readonly JudgedTile[];
  readonly fit: RisingFit;
  readonly firingEffects: readonly FiringEffect[];
  readonly validation: Validation;
}

/**
 * What puts a fit in doubt, each with its number, its threshold and what to do; the heaviest first.
 *
 * @param examined - tiles and fit
 * @returns none for a sound fit
 */
export function diagnostics({ tiles, fit, firingEffects, validation }: Examined): Diagnostic[] {
  if (tiles.length === 0) return [nothingLearnt()];
  return [
    ...fallingHeat(fit),
    ...fewTiles(tiles),
    ...separatedStages(fit),
    ...doubtfulApproximation(fit),
    ...unseenCones(tiles),
    ...(validation.byCone.folds === 0 ? [oneCone(tiles)] : conesOfOneLoad(tiles)),
    ...oxidesWithoutColumn(tiles),
    ...unknownFirings(firingEffects),
  ];
}

function nothingLearnt(): Diagnostic {
  return {
    kind: 'few tiles',
    about: 'any',
    value: 0,
    threshold: FEW_TILES,
    text: 'no judged tile: every answer is what is usual elsewhere, and nothing in it comes from this studio',
  };
}

function fallingHeat({ heatBefore, heatAfter }: RisingFit): Diagnostic[] {
  const said = (check: HeatCheck) =>
    `for ${check.falling} of ${check.glazes} fitted glazes, by up to ${check.worst.toFixed(3)} over a quarter of a cone`;
  const advice =
    heatBefore.worst >= CONTRARY_FALL
      ? 'hotter tiles came out less melted; look whether cones, firings or verdicts are mixed up'
      : 'heat hardly shows in these tiles; fire some of these glazes at another cone';
  const told = { kind: 'heat hardly shows', about: 'melt', threshold: SEEN_FALL } as const;
  if (heatAfter.worst >= SEEN_FALL) {
    const text = `the chance to melt falls with more heat ${said(heatAfter)}: ${advice}`;
    return [{ ...told, value: heatAfter.worst, text }];
  }
  if (heatBefore.worst < SEEN_FALL) return [];
  const text = `by the tiles alone the chance to melt would fall with more heat ${said(heatBefore)}; it is held not to: ${advice}`;
  return [{ ...told, value: heatBefore.worst, text }];
}

function fewTiles(tiles: readonly JudgedTile[]): Diagnostic[] {
  const count = (...wanted: JudgedTile['verdict'][]) =>
    tiles.filter(({ verdict }) => wanted.includes(verdict)).length;
  const sides = [
    ['underfired', count('underfired'), 'melt'],
    ['melted', count('matte', 'gloss', 'melted'), 'melt'],
    ['matte', count('matte'), 'gloss'],
    ['gloss', count('gloss'), 'gloss'],
  ] as const;
  return sides
    .filter(([, tilesOnSide]) => tilesOnSide < FEW_TILES)
    .map(([side, value, boundary]) => ({
      kind: 'few tiles',
      about: side,
      value,
      threshold: FEW_TILES,
      text:
        `${value} ${value === 1 ? 'tile' : 'tiles'} judged ${side} (fewer than ${FEW_TILES}): the ${boundary} boundary ` +
        'rests mostly on what is usual elsewhere; fire and judge more of that side',
    }));
}

/** What a stage asks, as a potter would say it. */
const SIDES: Readonly<Record<StageName, readonly [yes: string, no: string]>> = {
  melt: ['melted', 'underfired'],
  gloss: ['gloss', 'matte'],
};

/** Where the fit parts the verdicts without an exception, nothing in the tiles says how wide the boundary is. */
function separatedStages({ design, fit }: RisingFit): Diagnostic[] {
  const { scales, weights, loads, stretch } = fit;
  const { blocks } = problemAt(design, scales, weights, stretch);
  const unknowns = unknownsAt(design, scales, weights, loads, stretch);
  return STAGES.flatMap((name, s) => {
    const stage = design.stages[s]!;
    const logOdds = blockLogOdds(blocks[s]!, s * design.stages[0]!.size, unknowns);
    const yesTiles = stage.tiles.filter((_, i) => stage.outcome[i] === 1).length;
    if (Math.min(yesTiles, stage.tiles.length - yesTiles) < TELLING_SIDE) return [];
    let [leastYes, mostNo] = [Infinity, -Infinity];
    stage.tiles.forEach((_, i) => {
      if (stage.outcome[i] === 1) leastYes = Math.min(leastYes, logOdds[i]!);
      else mostNo = Math.max(mostNo, logOdds[i]!);
    });
    const gap = leastYes - mostNo;
    if (!(gap > 0)) return [];
    const [yes, no] = SIDES[name];
    const text =
      `every ${yes} tile stands clear of every ${no} one (by ${gap.toFixed(1)} log-odds, more than 0): how sharp that ` +
      'boundary is, and where between them it runs, rests on what is usual elsewhere; fire tiles between them';
    return [{ kind: 'separated', about: name, value: gap, threshold: 0, text }];
  });
}

/**
 * Where the log-odds of a verdict stand two sds apart at the mode and at the centre, what the tiles leave open there has
 * two sides: the verdict is wrong, or its neighbours mislead.
 */
function doubtfulApproximation({ design, fit: { modeShift } }: RisingFit): Diagnostic[] {
  const { sds, stage, row } = modeShift;
  if (sds < DOUBTFUL_SHIFT) return [];
  const { tile } = design.stages[stage]!.tiles[row]!;
  const text =
    `what the tiles say near ${quoted(tile)} is far from Gaussian (its log-odds move by ${sds.toFixed(1)} sds, ` +
    `${DOUBTFUL_SHIFT} or more, from the likeliest to the middle): that verdict or its neighbours' may be wrong; look at ` +
    'them again, and fire that glaze once more';
  return [
    { kind: 'approximation doubtful', about: tile, value: sds, threshold: DOUBTFUL_SHIFT, text },
  ];
}

function unseenCones(tiles: readonly JudgedTile[]): Diagnostic[] {
  const nearest = (cone: number) =>
    tiles.reduce((least, { heat }) => Math.min(least, Math.abs(heat.coneIndex - cone)), Infinity);
  return MAIN_CONES.filter((cone) => nearest(cone) > NEAR_CONE).map((cone) => ({
    kind: 'cone without tiles',
    about: coneText(cone),
    value: nearest(cone),
    threshold: NEAR_CONE,
    text: `no judged tile at cone ${coneText(cone)}: answers there are carried over from other cones`,
  }));
}

function oneCone(tiles: readonly JudgedTile[]): Diagnostic {
  return {
    kind: 'one cone',
    about: coneText(tiles[0]!.heat.coneIndex),
    value: 1,
    threshold: 2,
    text: 'all tiles are of one cone: how the model holds by cone cannot be tested',
  };
}

/** Where a cone was fired once, an error of that load and what the cone does look the same. */
function conesOfOneLoad(tiles: readonly JudgedTile[]): Diagnostic[] {
  const once = foldsByCone(tiles).flatMap(({ leftOut, tiles: own }) => {
    const loads = new Set(own.map(({ load }) => load));
    const [first] = own;
    if (loads.size > 1 || first?.firing === undefined) return [];
    return [{ cone: coneText(Number(leftOut)), firing: first.firing }];
  });
  if (once.length === 0) return [];
  const named = shortened(once.map(({ cone, firing }) => `${cone} (${firing})`));
  const [cones, are] =
    once.length === 1 ? ['cone', 'are of one load'] : ['cones', 'are of one load each'];
  const text =
    `all judged tiles of ${cones} ${named} ${are}: its own error and what the cone does ` +
    'cannot be told apart; fire another load there';
  const about = once.map(({ cone }) => cone).join(', ');
  return [{ kind: 'one load', about, value: once.length, threshold: 0, text }];
}

/** Oxides that matter to a tile by a step or more, and that no column of the model stands for. */
function oxidesWithoutColumn(tiles: readonly JudgedTile[]): Diagnostic[] {
  const counts = OXIDES.filter((oxide) => !hasColumn(oxide))
    .map((oxide) => ({
      oxide,
      count: tiles.filter(({ unity }) => (unity[oxide] ?? 0) >= OXIDE_STEP[oxide]).length,
    }))
    .filter(({ count }) => count > COMMON_SHARE * tiles.length)
    .sort((a, b) => b.count - a.count);
  const [first] = counts;
  if (first === undefined) return [];
  const named = counts.map(({ oxide, count }) => `${oxide} in ${count}`).join(', ');
  return [
    {
      kind: 'oxide without a column',
      about: first.oxide,
      value: first.count / tiles.length,
      threshold: COMMON_SHARE,
      text:
        `of ${tiles.length} fitted tiles many hold an oxide whose own effect is not modelled (${named}, a step or more ` +
        'each): it counts in what lies inside the archive, not in the chances; ask about glazes that hold as much of it',
    },
  ];
}

function unknownFirings(effects: readonly FiringEffect[]): Diagnostic[] {
  return effects
    .filter(({ unknown }) => unknown > 0)
    .map(({ column, known, unknown }) => ({
      kind: 'firing not recorded',
      about: column,
      value: unknown,
      threshold: 0,
      text:
        `${column} is recorded for ${known} of ${known + unknown} matte and gloss tiles; the others count as usual: ` +
        'write it into firings.csv where it is known',
    }));
}
