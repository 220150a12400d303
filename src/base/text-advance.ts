/** Advances of Inter in thousandths of its size, measured in a browser, regular and semibold, for the letters below. */
const LETTERS =
  ' !"#$%&\'()*+,-./0123456789:;<=>?@ABCDEFGHIJKLMNOPQRSTUVWXYZ[\\]^_`abcdefghijklmnopqrstuvwxyz{|}~–…°²³·×→←±−µ§ÄÖÜäöüßéèáàçñ';
const REGULAR =
  '281,288,466,633,642,982,644,300,365,365,501,662,288,460,288,360,631,407,610,618,646,593,620,566,619,620,288,302,662,662,662,511,966,690,654,730,722,601,590,746,743,269,571,672,565,903,753,765,639,765,644,642,646,744,690,985,682,679,629,365,360,365,471,456,323,562,612,571,612,583,370,613,591,242,242,549,242,876,591,600,612,612,376,528,327,591,562,818,546,562,552,426,333,426,662,500,864,456,442,446,288,662,838,838,662,662,586,568,690,765,744,562,600,591,616,583,583,562,562,571,591';
const SEMIBOLD =
  '252,321,523,644,650,1004,663,326,373,373,540,673,319,465,319,379,660,423,623,636,666,612,640,576,640,640,319,329,673,673,673,543,999,728,659,737,722,605,588,749,746,277,580,703,565,922,759,769,645,773,652,650,660,736,728,1020,720,713,652,373,379,373,481,469,351,574,624,583,624,591,389,625,612,262,262,569,262,900,612,609,624,624,397,549,353,612,587,839,569,588,566,455,359,455,673,500,956,458,454,463,319,673,838,838,673,673,614,568,728,769,736,574,609,612,644,591,591,574,574,583,612';

const table = (list: string): ReadonlyMap<string, number> => {
  const widths = list.split(',').map(Number);
  return new Map([...LETTERS].map((letter, i) => [letter, (widths[i] ?? 0) / 1000]));
};
const TABLES = { regular: table(REGULAR), semibold: table(SEMIBOLD) };
/** Height of its capitals and figures, in its size. */
export const CAP_HEIGHT = 0.73;
/** Wide enough for nearly any letter that is not in the list. */
const UNKNOWN = 1;

/** Width of a text in the unit of its size, without kerning (which makes it a hair narrower); 500 lies halfway. */
export function advance(text: string, size: number, weight: 400 | 500 | 600 = 400): number {
  const heavy = (weight - 400) / 200;
  let sum = 0;
  for (const letter of text)
    sum += (TABLES.regular.get(letter) ?? UNKNOWN) * (1 - heavy) + (TABLES.semibold.get(letter) ?? UNKNOWN) * heavy;
  return sum * size;
}

/** Whether the width of every letter is known, so that a viewer without the font can be told how long the text is. */
export const isMeasured = (text: string): boolean => {
  for (const letter of text) if (!TABLES.regular.has(letter)) return false;
  return true;
};

/** Broken at blanks, and inside words that are longer than a line, into lines no wider than `width`; never fewer than one. */
export function brokenAt(text: string, size: number, width: number, weight: 400 | 500 | 600 = 400): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(/\s+/).filter((each) => each !== '')) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (advance(longer, size, weight) <= width) {
      line = longer;
      continue;
    }
    if (line !== '') lines.push(line);
    const pieces = hardBreak(word, size, width, weight);
    lines.push(...pieces.slice(0, -1));
    line = pieces.at(-1) ?? '';
  }
  return [...lines, ...(line !== '' || lines.length === 0 ? [line] : [])];
}

function hardBreak(word: string, size: number, width: number, weight: 400 | 500 | 600): string[] {
  const pieces: string[] = [];
  let piece = '';
  for (const letter of word) {
    if (piece !== '' && advance(piece + letter, size, weight) > width) {
      pieces.push(piece);
      piece = '';
    }
    piece += letter;
  }
  return [...pieces, piece];
}

/** One line: what has no room is cut at its end, and `…` marks it. */
export function cutTo(text: string, size: number, width: number, weight: 400 | 500 | 600 = 400): string {
  if (advance(text, size, weight) <= width) return text;
  const letters = [...text];
  while (letters.length > 0 && advance(`${letters.join('')}…`, size, weight) > width) letters.pop();
  return `${letters.join('').trimEnd()}…`;
}
