import type { Boundary, BoundaryAxis } from '../predict/answers.ts';
import { alignedLines, type Align } from './aligned.ts';
import { signed } from './figures.ts';
import { INDENT, type Look, type Section } from './page.ts';

/**
 * Words for an axis.
 *
 * @example
 * AXIS_WORDS.SiO2; // 'silica'
 */
export const AXIS_WORDS: Readonly<Record<BoundaryAxis, string>> = {
  Al2O3: 'alumina',
  SiO2: 'silica',
  'SiO2:Al2O3': 'SiO2:Al2O3',
};

const ALIGN: readonly Align[] = ['left', 'left', 'right', 'right', 'left'];

/**
 * How far each boundary moves for one cone more heat, with its interval.
 *
 * @param boundaries - of all cones
 * @param look - width of the page
 * @returns the section: a row for each cone at which a boundary has a place
 */
export function moveSection(boundaries: readonly Boundary[], { columns }: Look): Section {
  const moving = boundaries.filter(({ perCone }) => perCone !== null);
  const names = [...new Set(moving.map(nameOf))];
  const rows = names.flatMap((name) =>
    moving
      .filter((one) => nameOf(one) === name)
      .map((one, i) => [...(i === 0 ? nameCells(one) : ['', '']), ...moveCells(one)]),
  );
  const head = ['along', 'from and to', 'cone', 'moved', '90 % interval'];
  const lines = alignedLines({ rows: [head, ...rows], align: ALIGN, indent: INDENT, columns });
  return { heading: 'Moved by one cone more heat', lines: rows.length === 0 ? [] : lines };
}

/**
 * Digits that a place along an axis is known to: a hundredth of a mole, a tenth of a ratio.
 *
 * @param along - the axis
 * @returns digits after the point
 * @example
 * digitsAlong('Al2O3'); // 2
 */
export function digitsAlong(along: BoundaryAxis): number {
  return along === 'SiO2:Al2O3' ? 1 : 2;
}

/** Crossings of one boundary with one line are told apart by what lies below and above. */
function nameOf(boundary: Boundary): string {
  return nameCells(boundary).join(' ');
}

function nameCells({ along, below, above }: Boundary): string[] {
  return [AXIS_WORDS[along], `${below} to ${above}`];
}

function moveCells({ cone, perCone, perConeInterval90, along }: Boundary): string[] {
  const digits = digitsAlong(along);
  const [low, high] = perConeInterval90;
  const known = low !== null && high !== null;
  const interval = known ? `${signed(low, digits)} to ${signed(high, digits)}` : 'not known';
  return [cone, signed(perCone, digits), interval];
}
