import { textWidth } from './labels.ts';
import { MODULE_PX } from './strokes.ts';

/** Width in modules of a text of a size in modules. */
export const fitted = (text: string, size: number): { readonly width: number } => ({
  width: textWidth(text, size * MODULE_PX),
});

const widthOf = (text: string, size: number): number => fitted(text, size).width;

/** Broken at blanks into lines that fit; what is left over is cut in its middle, and `…` marks it. */
export function wrapped(text: string, size: number, width: number, most: number): readonly string[] {
  const words = text.split(/\s+/).filter((word) => word !== '');
  const lines: string[] = [];
  while (words.length > 0) {
    let line = words.shift() as string;
    const isLast = lines.length === most - 1;
    while (words.length > 0 && (isLast || widthOf(`${line} ${words[0] as string}`, size) <= width))
      line += ` ${words.shift() as string}`;
    lines.push(cut(line, size, width));
  }
  return lines;
}

function cut(text: string, size: number, width: number): string {
  if (widthOf(text, size) <= width) return text;
  const letters = [...text];
  for (let keep = letters.length - 1; keep > 1; keep--) {
    const tail = Math.floor(keep / 2);
    const short = `${letters.slice(0, keep - tail).join('')}…${letters.slice(letters.length - tail).join('')}`;
    if (widthOf(short, size) <= width) return short;
  }
  return '…';
}

export interface Header {
  readonly labels: readonly { readonly at: number; readonly text: string; readonly row: number }[];
  readonly rows: number;
  /** Lines of numbers with the names that had no room, side by side. */
  readonly legend: readonly (readonly { readonly text: string; readonly at: number }[])[];
}

const LEGEND_WIDTH = 100;

/** Names over the steps where all of them fit, else numbers, in further rows where these would touch, and a list. */
export function headerOf(
  steps: readonly { readonly name: string; readonly from: number; readonly to: number }[],
  size: number,
): Header {
  const numbered = steps.map(({ name }, i) => (name === String(i + 1) ? name : `${i + 1} ${name}`));
  const fits = steps.every(({ from, to }, i) => widthOf(numbered[i] as string, size) <= to - from - 0.6);
  const free: number[] = [];
  const labels = steps.map(({ from, to }, i) => {
    const text = fits ? (numbered[i] as string) : String(i + 1);
    const [at, half] = [(from + to) / 2, widthOf(text, size) / 2 + 0.25];
    const open = free.findIndex((end) => end <= at - half);
    const row = open >= 0 ? open : free.length;
    free[row] = at + half;
    return { at, text, row };
  });
  if (fits || numbered.every((text, i) => text === String(i + 1))) return { labels, rows: free.length, legend: [] };
  const legend: { text: string; at: number }[][] = [];
  const column = Math.min(LEGEND_WIDTH, Math.max(...numbered.map((text) => widthOf(text, size))) + 3);
  const across = Math.max(1, Math.floor(LEGEND_WIDTH / column));
  numbered.forEach((text, i) => {
    if (i % across === 0) legend.push([]);
    legend.at(-1)?.push({ text: cut(text, size, LEGEND_WIDTH), at: (i % across) * column });
  });
  return { labels, rows: free.length, legend };
}

/** Round values from 0 to at most `end`, about `count` of them. */
export function niceTicks(end: number, count: number): readonly number[] {
  if (!(end > 0)) return [0];
  const rough = end / count;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = power * ([1, 2, 5, 10].find((f) => f * power >= rough * 0.999) ?? 10);
  return Array.from({ length: Math.floor(end / step + 1e-9) + 1 }, (_, i) => i * step);
}

/** The least of 1, 2, 2.5, 5 times a power of ten that is not below the value. */
export function niceCeiling(value: number): number {
  if (!(value > 0)) return 1;
  const power = 10 ** Math.floor(Math.log10(value));
  return power * ([1, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10].find((f) => f * power >= value * 0.999999) ?? 10);
}
