import type { Fault } from '../errors.ts';
import type { Model, Stage } from '../model/model.ts';
import { alignedLines } from './aligned.ts';
import { countsLine } from './counts-line.ts';
import { fixed } from './figures.ts';
import { heldOutSections } from './held-out-sections.ts';
import { loadSection } from './load-sections.ts';
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
  const { model, leftOut, writtenTo, detail = false } = outcome;
  const notes = [...model.notes, ...leftOutNote(leftOut)];
  return pageOf(
    [
      { lines: [countsLine(model.archive.counts), ...fittedLines(model, look)] },
      ...heldOutSections(model.validation, detail, look),
      loadSection(model, look),
      ...(detail ? [groupSection('Melting', model.melt), groupSection('Gloss', model.gloss)] : []),
      { heading: 'Mind', lines: notes.map((note) => point(note, look)) },
      { lines: [writtenLine(writtenTo)] },
    ],
    look,
  );
}

function fittedLines({ archive, melt, gloss }: Model, look: Look): string[] {
  const loads = new Set(archive.tiles.filter(({ firing }) => firing).map(({ load }) => load)).size;
  const text =
    `Of the fitted tiles ${grouped(melt.tiles.no)} are underfired and ${grouped(melt.tiles.yes)} ` +
    `melted; of the melted ${grouped(gloss.tiles.no)} are matte and ${grouped(gloss.tiles.yes)} gloss. ` +
    `The archive names ${countOf(loads, 'load')}.`;
  return [wrapped(text, look)];
}

function leftOutNote(faults: readonly Fault[]): string[] {
  if (faults.length === 0) return [];
  return [`rows with faults were left out (${countOf(faults.length, 'fault')}; check lists them)`];
}

function groupSection(name: string, { groups, loadSd }: Stage): Section {
  const rows = groups.map(({ name: group, startSd, sd }) => [
    group,
    fixed(startSd, 2),
    fixed(sd, 2),
  ]);
  return {
    heading: `${name}: sd of each group of weights, before and after the tiles`,
    lines: alignedLines({
      rows: [['group', 'before', 'after'], ...rows, ['loads', '', fixed(loadSd, 2)]],
      align: ['left', 'right', 'right'],
      indent: INDENT,
    }),
  };
}

function writtenLine(writtenTo: string | undefined): string {
  return writtenTo === undefined
    ? 'No model was written: --out model.json keeps it for the other commands.'
    : `Model written to ${printable(writtenTo)}`;
}
