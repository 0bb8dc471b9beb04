import * as z from 'zod';
import { coneIndex, coneText } from '../firing/cone.ts';
import { ConeError } from '../errors.ts';
import { expectedNumber, parseDecimal, type DecimalMark } from './decimal-mark.ts';
import { got, listed, quoted } from './found-text.ts';
import { LIMITS } from './limits.ts';
import { nearestNames } from './nearest-name.ts';

type Check = (message: string) => void;

/** A cell that may be blank (then undefined) or is read by `read`, which names what is wrong. */
function optionalCell<Value>(read: (text: string, wrong: Check) => Value | undefined) {
  return z.string().transform((text, context): Value | undefined => {
    const trimmed = text.trim();
    if (trimmed === '') return undefined;
    return read(trimmed, (message) => {
      context.addIssue({ code: 'custom', message, input: text });
    });
  });
}

/** A cell that may not be blank. */
function requiredCell<Value>(
  what: string,
  read: (text: string, wrong: Check) => Value | undefined,
) {
  return z.string().transform((text, context): Value => {
    const wrong = (message: string) => {
      context.addIssue({ code: 'custom', message, input: text });
    };
    const trimmed = text.trim();
    if (trimmed === '') wrong(`expected ${what}, got a blank cell`);
    return (trimmed === '' ? undefined : read(trimmed, wrong)) ?? z.NEVER;
  });
}

/** Free text, kept as written but for blanks around it. */
export const textCell = () => optionalCell((text) => text);

const readName = (text: string, wrong: Check) => {
  if (text.length <= LIMITS.nameCharacters) return text;
  wrong(`expected a name of at most ${LIMITS.nameCharacters} characters, got ${text.length}`);
  return undefined;
};

/** A name; blank where there is none. */
export const nameCell = () => optionalCell(readName);

/** A name that may not be blank. */
export const requiredNameCell = (what: string) => requiredCell(what, readName);

/** What a number means, where it may lie, and why no further. */
export interface NumberRange {
  /** With its unit: `a peak in °C`. */
  readonly what: string;
  readonly least: number;
  readonly most: number;
  /** The least value itself is none. */
  readonly isAbove?: boolean;
  /** Why it cannot lie outside. */
  readonly reason?: string;
}

function readNumber(mark: DecimalMark, range: NumberRange) {
  const { what, least, most, isAbove = false, reason } = range;
  const limits = isAbove ? `above ${least}, at most ${most}` : `from ${least} to ${most}`;
  const because = reason === undefined ? '' : ` (${reason})`;
  return (text: string, wrong: Check): number | undefined => {
    const value = parseDecimal(text, mark);
    const isLow = value !== undefined && (isAbove ? value <= least : value < least);
    if (value !== undefined && !isLow && value <= most) return value;
    if (value !== undefined) {
      wrong(`expected ${what} ${limits}${because}, ${got(text)}`);
    } else {
      wrong(`expected ${what}: ${expectedNumber(text, mark)}, ${got(text)}`);
    }
    return undefined;
  };
}

/** A number; blank where it is not known. */
export const numberCell = (mark: DecimalMark, range: NumberRange) =>
  optionalCell(readNumber(mark, range));

/** A number that may not be blank. */
export const requiredNumberCell = (mark: DecimalMark, range: NumberRange) =>
  requiredCell(range.what, readNumber(mark, range));

/** One of a few words, in any capitals; blank where not known. */
export const wordCell = <const Word extends string>(words: readonly Word[]) =>
  optionalCell((text, wrong): Word | undefined => {
    const word = words.find((known) => known === text.toLowerCase());
    if (word === undefined) {
      const nearest = listed(nearestNames(text, words));
      wrong(
        `expected ${listed([...words, 'a blank cell'])}, ${got(text)}; nearest known: ${nearest}`,
      );
    }
    return word;
  });

/** yes or no; blank where not known. */
export const yesNoCell = () => {
  const words: Readonly<Record<string, boolean>> = { yes: true, no: false };
  return optionalCell((text, wrong): boolean | undefined => {
    const word = text.toLowerCase();
    if (Object.hasOwn(words, word)) return words[word];
    wrong(`expected yes, no or a blank cell, ${got(text)}`);
    return undefined;
  });
};

function readCone(allowsComma: boolean) {
  return (text: string, wrong: Check): string | undefined => {
    try {
      return coneText(coneIndex(allowsComma ? text.replace(',', '.') : text));
    } catch (error) {
      if (!(error instanceof ConeError)) throw error;
      wrong(`expected a cone from 022 to 42 such as 6, 06 or 6.5, ${got(text)}`);
      return undefined;
    }
  };
}

/** A cone as the trade writes it; a half may be written with a comma where commas do not separate. */
export const coneCell = (allowsComma: boolean) => optionalCell(readCone(allowsComma));

/** A cone that may not be blank. */
export const requiredConeCell = (allowsComma: boolean) =>
  requiredCell('a cone', readCone(allowsComma));

/** An ISO date, with or without a time; kept as written. */
export const dateCell = () =>
  optionalCell((text, wrong): string | undefined => {
    const date =
      /^\d{4}-\d{2}-\d{2}(?=$|[T ]\d{2}:\d{2}(?::\d{2}(?:\.\d+)?)?(?:Z|[+-]\d{2}:?\d{2})?$)/.exec(
        text,
      );
    // A day that the month lacks is moved on by Date, so it does not come back the same.
    const time = date === null ? Number.NaN : Date.parse(`${date[0]}T00:00:00Z`);
    if (!Number.isNaN(time) && new Date(time).toISOString().startsWith(date?.[0] ?? '-'))
      return text;
    wrong(`expected a date such as 2024-03-31, ${got(text)}`);
    return undefined;
  });

/** The bare name of a file inside the archive: no folder, so that nothing outside can be meant. */
export const fileNameCell = () =>
  optionalCell((text, wrong): string | undefined => {
    const isBare = !/[/\\:\p{Cc}]/u.test(text) && text !== '.' && text !== '..';
    if (isBare && text.length <= LIMITS.nameCharacters) return text;
    wrong(`expected the name of a file in the archive, without a folder, got ${quoted(text)}`);
    return undefined;
  });
