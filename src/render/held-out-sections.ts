import type { HeldOut, Validation } from '../model/model.ts';
import { alignedLines, type Align } from './aligned.ts';
import { fixed, partPercent } from './figures.ts';
import { groupNames, groupsTogether } from './group-words.ts';
import { INDENT, prose, type Look, type Section } from './page.ts';
import { cutTo, printable } from './printable.ts';
import { countOf, grouped, listOf } from './sentences.ts';

/** The three accounts, in the order of their weight for the tool's own question. */
const ACCOUNTS = [
  ['byCone', 'cone'],
  ['byLoad', 'load'],
  ['byGlaze', 'glaze'],
] as const satisfies readonly (readonly [keyof Validation, string])[];

const WIDEST_NAME = 24;
/** Of fewer tiles a share that is right is not even known to 11 % give or take (binomial, one sd). */
const TELLING_TILES = 20;

/**
 * How a model holds on tiles that it did not see, for the page of `fit`.
 *
 * @param validation - of the model
 * @param look - width and marking
 * @returns sections: overview, cone by cone, reliability; `detail` adds every load and glaze
 */
export function heldOutSections(validation: Validation, detail: boolean, look: Look): Section[] {
  const shown = detail ? ACCOUNTS : ACCOUNTS.slice(0, 1);
  return [
    {
      heading: 'How it holds on tiles it did not see',
      lines: [
        ...fewTilesNote(validation).map((note) => prose(`${note}.`, look)),
        prose(groupWords(validation), look),
        ...overview(validation, look),
        ...coneWords(validation.byCone, look),
        prose(
          'Log score: mean logarithm of the probability given to what was seen; 0 is perfect. Shares: ' +
            'the same from the shares of the surfaces alone. Sure: called 90 % sure or more.',
          look,
        ),
      ],
    },
    ...shown.map(([account, group]) => ({
      heading: `Left out in turn, ${group} by ${group}`,
      lines: partLines(validation[account], look),
    })),
    { heading: 'Is a stated probability kept?', lines: reliabilityLines(validation, look) },
  ];
}

/**
 * A caution where the tiles are too few for the account to mean much.
 *
 * @param validation - of the model
 * @returns one sentence without its full stop, or none
 */
export function fewTilesNote(validation: Validation): string[] {
  const tiles = Math.max(...ACCOUNTS.map(([account]) => validation[account].tiles));
  if (tiles === 0 || tiles >= TELLING_TILES) return [];
  return [
    `${countOf(tiles, 'judged tile')}: so few say almost nothing about how the model holds; judge by it ` +
      `from about ${TELLING_TILES} tiles on`,
  ];
}

/** What is left out together, as a potter would say it. */
function groupWords({ byLoad, byGlaze }: Validation): string {
  const [loads, glazes] = [groupsTogether(byLoad), groupsTogether(byGlaze)];
  const together = [
    ...(loads === undefined
      ? []
      : [`the ${grouped(loads)} loads in ${grouped(byLoad.folds)} lots`]),
    ...(glazes === undefined
      ? []
      : [`the ${grouped(glazes)} glazes in ${grouped(byGlaze.folds)} lots`]),
  ];
  const lots = together.length === 0 ? '' : ` To save time, ${listOf(together)}.`;
  return (
    'A group of tiles is left out, the rest fitted anew and the group predicted; then the next one, ' +
    'until each tile was left out once. A group: all tiles of a cone (6.5 counts to 7), of a load, or ' +
    `of a glaze (a recipe, a formula or a blend).${lots}`
  );
}

function overview(validation: Validation, { columns }: Look): string[] {
  const head = ['left out by', 'groups', 'tiles', 'log score', 'shares', 'sure', 'of them right'];
  const rows = ACCOUNTS.map(([account, group]) => [group, ...overviewCells(validation[account])]);
  return alignedLines({
    rows: [head, ...rows],
    align: ['left', ...head.slice(1).map((): Align => 'right')],
    indent: INDENT,
    columns,
  });
}

function overviewCells({ tiles, folds, logScore, baseRateLogScore, sure }: HeldOut): string[] {
  if (folds === 0) return ['-'];
  const { called, right } = sure;
  const share = called === 0 ? '-' : `${grouped(right)} (${partPercent(right, called)})`;
  const scores = [fixed(logScore, 2), fixed(baseRateLogScore, 2)];
  return [grouped(folds), grouped(tiles), ...scores, grouped(called), share];
}

/** The account by cone in words: it is what the tool is asked. */
function coneWords({ folds, logScore, baseRateLogScore, sure }: HeldOut, look: Look): string[] {
  if (folds === 0 || logScore === null || baseRateLogScore === null) {
    return [
      prose(
        'All tiles are of one cone: how well one cone is told from another is not known.',
        look,
      ),
    ];
  }
  const [given, bare] = [fixed(Math.exp(logScore), 2), fixed(Math.exp(baseRateLogScore), 2)];
  const better = logScore > baseRateLogScore ? 'better than' : 'NO better than';
  const { called, right } = sure;
  const sureWords =
    called === 0
      ? 'It called no tile 90 % sure.'
      : `Of ${grouped(called)} tiles called 90 % sure or more, ${grouped(right)} were right.`;
  return [
    prose(
      `At a cone it had not seen, it gave the surface that came out a probability of ${given} ` +
        `(geometric mean), ${better} the ${bare} that the shares of the surfaces alone give. ${sureWords}`,
      look,
    ),
  ];
}

function partLines(account: HeldOut, { columns }: Look): string[] {
  const { parts } = account;
  if (parts.length === 0) return [];
  const names = groupNames(account);
  const rows = parts.map(({ tiles, logScore, baseRateLogScore }, i) => [
    cutTo(printable(names[i] ?? ''), WIDEST_NAME),
    grouped(tiles),
    fixed(logScore, 2),
    fixed(baseRateLogScore, 2),
  ]);
  return alignedLines({
    rows: [['left out', 'tiles', 'log score', 'shares'], ...rows],
    align: ['left', 'right', 'right', 'right'],
    indent: INDENT,
    columns,
  });
}

function reliabilityLines(validation: Validation, look: Look): string[] {
  const tested = ACCOUNTS.filter(([account]) => validation[account].folds > 0);
  const [first] = tested;
  if (first === undefined) return [];
  const head = ['stated', ...tested.map(([, group]) => `by ${group}`)];
  const rows = validation[first[0]].reliability.map(({ from, to }, row) => [
    `${Math.round(100 * from)} to ${Math.round(100 * to)} %`,
    ...tested.map(([account]) => reliabilityCell(validation[account], row)),
  ]);
  const about = 'Tiles that were right, by the probability stated for the likeliest surface.';
  const { columns } = look;
  const table = alignedLines({ rows: [head, ...rows], indent: INDENT, gap: 3, columns });
  return [prose(about, look), ...table];
}

function reliabilityCell({ reliability }: HeldOut, row: number): string {
  const { tiles = 0, right = null } = reliability[row] ?? {};
  if (tiles === 0 || right === null) return '-';
  const count = Math.round(right * tiles);
  return `${grouped(count)} of ${grouped(tiles)} (${partPercent(count, tiles)})`;
}
