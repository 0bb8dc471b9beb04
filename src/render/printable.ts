import stringWidth from 'string-width';

/** Control, formatting and line-separating characters, and halves of a broken pair. */
const UNSAFE = /[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Cs}]/gu;
/** Shown where text was cut. */
const CUT_MARK = '..';

/**
 * A text that can be shown without moving the cursor, ringing the bell or running backwards.
 *
 * @param text - any text, such as a name from a file
 * @returns the text with every control or invisible character written as its code
 * @example
 * printable('Slate\u001b[2JHen'); // 'Slate\\x1b[2JHen'
 * printable('a\u202eb'); // 'a\\u{202e}b'
 */
export function printable(text: string): string {
  return text.replace(UNSAFE, (character) => {
    const code = (character.codePointAt(0) ?? 0).toString(16);
    return code.length <= 2 ? `\\x${code.padStart(2, '0')}` : `\\u{${code}}`;
  });
}

/**
 * Columns that a text takes in a terminal.
 *
 * @param text - printable text
 * @returns columns; two for a character of an East Asian script
 * @example
 * textWidth('Glaze'); // 5
 * textWidth('釉'); // 2
 */
export function textWidth(text: string): number {
  return stringWidth(text);
}

/**
 * A text cut to a width, so that a long name does not push a table apart.
 *
 * Its end stays, since names of a series differ there.
 *
 * @param text - printable text
 * @param width - columns at most, 6 or more
 * @returns the text, or its beginning, two dots and its end
 * @example
 * cutTo('North kiln load 112', 12); // 'North..d 112'
 * cutTo('Hen', 8); // 'Hen'
 */
export function cutTo(text: string, width: number): string {
  if (textWidth(text) <= width) return text;
  const letters = [...new Intl.Segmenter().segment(text)].map(({ segment }) => segment);
  const forEnd = Math.floor((width - CUT_MARK.length) / 2);
  const end = beginning([...letters].reverse(), forEnd).reverse();
  return beginning(letters, width - CUT_MARK.length - forEnd).join('') + CUT_MARK + end.join('');
}

function beginning(letters: readonly string[], width: number): string[] {
  const kept: string[] = [];
  let room = width;
  for (const letter of letters) {
    room -= textWidth(letter);
    if (room < 0) break;
    kept.push(letter);
  }
  return kept;
}
