import type { Fault } from '../errors.ts';
import type { Model, Stage } from '../model/model.ts';
import { alignedLines } from './aligned.ts';
import { countsLine } from './counts-line.ts';
import { fixed } from './figures.ts';
import { heldOutSections } from './held-out-sections.ts';
import { firingSection, loadSection } from './load-sections.ts';
import { INDENT, pageOf, point, type Look, type Section } from './page.ts';
import { printable } from './printable.ts';
import { countOf, grouped } from './sentences.ts';
import { wrapped } from './wrapped.ts';

/** What the page of `fit` says beside the model. */
export interface FitOutcome {
  readonly model: Model;
  /** Faults of rows that were left out. */
  readonly leftOut: readonly Fault[];
  /** Where the model was written; undefined if nowhere. */
  readonly writtenTo?: string | undefined;
  /** What puts the compositions of the archive in doubt. */
  readonly doubts?: readonly string[];
  /** Also the prior sds, and every load and glaze left out. */
  readonly detail?: boolean;
}

/**
 * The page of `fit`: what was fitted, how it holds on tiles left out, which loads stand out.
 *
 * @param outcome - model and what was done with it
 * @param look - width and marking
 * @returns the page
 */
export function fitPage(outcome: FitOutcome, look: Look): string {
  const { model, leftOut, writtenTo, detail = false, doubts = [] } = outcome;
  const notes = [...doubts, ...leftOutNote(leftOut), ...model.notes];
  return pageOf(
    [
      { lines: [wrapped(countsLine(model.archive.counts), look), ...fittedLines(model, look)] },
      ...(isNothingFitted(model) ? [] : heldOutSections(model.validation, detail, look)),
      loadSection(model, look),
      firingSection(model.firingEffects ?? [], look),
      ...(detail
        ? [groupSection('Melting', model.melt, look), groupSection('Gloss', model.gloss, look)]
        : []),
      { heading: 'Mind', lines: notes.map((note) => point(note, look)) },
      { lines: [wrapped(writtenLine(writtenTo), look)] },
    ],
    look,
  );
}

function isNothingFitted({ archive }: Model): boolean {
  return archive.counts.fitted === 0;
}

function fittedLines(model: Model, look: Look): string[] {
  const { archive, melt, gloss } = model;
  if (isNothingFitted(model)) return [wrapped('Nothing is fitted: no tile is judged.', look)];
  const text =
    `Fitted: ${grouped(melt.tiles.no)} underfired, ${grouped(melt.tiles.yes)} melted; of the melted ` +
    `${grouped(gloss.tiles.no)} matte, ${grouped(gloss.tiles.yes)} gloss. ` +
    loadWords(archive);
  return [wrapped(text, look)];
}

/** From which loads the tiles are: those of one share its error. */
function loadWords({ tiles }: Model['archive']): string {
  const loads = new Set(tiles.flatMap(({ firing, load }) => (firing === undefined ? [] : [load])));
  const alone = tiles.filter(({ firing }) => firing === undefined).length;
  const named = `The tiles were fired in ${countOf(loads.size, 'load')}`;
  if (tiles.length === 0) return 'There is no tile.';
  if (loads.size === 0) return 'No tile names its firing: each counts as a load of its own.';
  if (alone === 0) return `${named}.`;
  return `${named}, and ${grouped(alone)} without a firing count as a load of their own each.`;
}

function leftOutNote(faults: readonly Fault[]): string[] {
  if (faults.length === 0) return [];
  return [`rows with faults were left out (${countOf(faults.length, 'fault')}; check lists them)`];
}

function groupSection(
  name: string,
  { groups, residual, wrongVerdicts }: Stage,
  { columns }: Look,
): Section {
  const rows = groups.map(({ name: group, startSd, sd }) => [
    group,
    fixed(startSd, 2),
    fixed(sd, 2),
  ]);
  return {
    heading: `${name}: sd of each group, before and after the tiles`,
    lines: alignedLines({
      rows: [
        ['group', 'before', 'after'],
        ...rows,
        ['smooth departure', fixed(residual.startSd, 2), fixed(residual.sd, 2)],
        ['share of wrong verdicts', '', fixed(wrongVerdicts, 3)],
      ],
      align: ['left', 'right', 'right'],
      indent: INDENT,
      columns,
    }),
  };
}

function writtenLine(writtenTo: string | undefined): string {
  return writtenTo === undefined
    ? 'No model was written: --out model.json keeps it for the other commands.'
    : `Model written to ${printable(writtenTo)}`;
}
