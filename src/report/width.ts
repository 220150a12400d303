/** Text in columns of equal letters, as a terminal shows it. */

// East Asian wide letters and emoji take two columns, combining marks none.
const WIDE =
  /[\u1100-\u115f\u2e80-\ua4cf\uac00-\ud7a3\uf900-\ufaff\ufe30-\ufe6f\uff00-\uff60\uffe0-\uffe6\u{1f300}-\u{1faff}]/u;
const NONE = /[\p{Mn}\p{Me}\p{Cf}]/u;

const widthOfLetter = (letter: string): number => (NONE.test(letter) ? 0 : WIDE.test(letter) ? 2 : 1);

/** Nearly every cell: letters of one column each. */
const SIMPLE = /^[\x20-\x7e–→─]*$/;

/** Columns that the text takes. */
export function widthOf(text: string): number {
  if (SIMPLE.test(text)) return text.length;
  let width = 0;
  for (const letter of text) width += widthOfLetter(letter);
  return width;
}

export function padEnd(text: string, width: number): string {
  return text + ' '.repeat(Math.max(0, width - widthOf(text)));
}

export function padStart(text: string, width: number): string {
  return ' '.repeat(Math.max(0, width - widthOf(text))) + text;
}

/** At most `width` columns; what is cut off is marked by `…`. */
export function cutTo(text: string, width: number): string {
  if (widthOf(text) <= width) return text;
  let out = '';
  let used = 1;
  for (const letter of text) {
    used += widthOfLetter(letter);
    if (used > width) break;
    out += letter;
  }
  return width < 1 ? '' : `${out}…`;
}

/** A label on one line: control characters, which could move the cursor or start a command of the terminal, become blanks. */
export const plain = (text: string): string =>
  SIMPLE.test(text) ? text : text.replace(/[\p{Cc}\u2028\u2029\u202a-\u202e\u2066-\u2069]+/gu, ' ');
