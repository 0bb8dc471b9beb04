import type { HeldOut, HeldOutPart, Validation } from '../model/model.ts';
import { alignedLines, type Align } from './aligned.ts';
import { fixed, partPercent } from './figures.ts';
import { INDENT, prose, type Look, type Section } from './page.ts';
import { cutTo, printable } from './printable.ts';
import { grouped } from './sentences.ts';

/** The three accounts, in the order of their weight for the tool's own question. */
const ACCOUNTS = [
  ['byCone', 'one cone'],
  ['byLoad', 'one load'],
  ['byGlaze', 'one glaze'],
] as const satisfies readonly (readonly [keyof Validation, string])[];

const WIDEST_NAME = 24;

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
        prose('Each part in turn is left out, the rest fitted anew, and the part predicted.', look),
        ...overview(validation),
        ...coneWords(validation.byCone, look),
        prose(
          'Log score: mean logarithm of the probability given to what was seen; 0 is perfect. Shares: ' +
            'the same from the shares of the surfaces alone. Sure: called 90 % sure or more.',
          look,
        ),
      ],
    },
    ...shown.map(([account, leftOut]) => ({
      heading: `Left out: ${leftOut} at a time`,
      lines: partLines(validation[account].parts),
    })),
    { heading: 'Is a stated probability kept?', lines: reliabilityLines(validation, look) },
  ];
}

function overview(validation: Validation): string[] {
  const head = ['left out', 'tiles', 'parts', 'log score', 'shares', 'sure', 'of them right'];
  const rows = ACCOUNTS.map(([account, leftOut]) => [
    leftOut,
    ...overviewCells(validation[account]),
  ]);
  return alignedLines({
    rows: [head, ...rows],
    align: ['left', ...head.slice(1).map((): Align => 'right')],
    indent: INDENT,
  });
}

function overviewCells({ tiles, folds, logScore, baseRateLogScore, sure }: HeldOut): string[] {
  if (folds === 0) return ['cannot be tested'];
  const { called, right } = sure;
  const share = called === 0 ? '-' : `${grouped(right)} (${partPercent(right, called)})`;
  const scores = [fixed(logScore, 2), fixed(baseRateLogScore, 2)];
  return [grouped(tiles), grouped(folds), ...scores, grouped(called), share];
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

function partLines(parts: readonly HeldOutPart[]): string[] {
  if (parts.length === 0) return [];
  const rows = parts.map(({ leftOut, tiles, logScore, baseRateLogScore }) => [
    cutTo(printable(leftOut), WIDEST_NAME),
    grouped(tiles),
    fixed(logScore, 2),
    fixed(baseRateLogScore, 2),
  ]);
  return alignedLines({
    rows: [['left out', 'tiles', 'log score', 'shares'], ...rows],
    align: ['left', 'right', 'right', 'right'],
    indent: INDENT,
  });
}

function reliabilityLines(validation: Validation, look: Look): string[] {
  const tested = ACCOUNTS.filter(([account]) => validation[account].folds > 0);
  const [first] = tested;
  if (first === undefined) return [];
  const head = ['stated', ...tested.map(([, leftOut]) => `${leftOut} out`)];
  const rows = validation[first[0]].reliability.map(({ from, to }, row) => [
    `${Math.round(100 * from)} to ${Math.round(100 * to)} %`,
    ...tested.map(([account]) => reliabilityCell(validation[account], row)),
  ]);
  const about = 'Tiles that were right, by the probability stated for the likeliest surface.';
  return [prose(about, look), ...alignedLines({ rows: [head, ...rows], indent: INDENT, gap: 3 })];
}

function reliabilityCell({ reliability }: HeldOut, row: number): string {
  const { tiles = 0, right = null } = reliability[row] ?? {};
  if (tiles === 0 || right === null) return '-';
  const count = Math.round(right * tiles);
  return `${grouped(count)} of ${grouped(tiles)} (${partPercent(count, tiles)})`;
}
