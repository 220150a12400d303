import type { FoldAnswer, FoldItem } from '../../worker/client.ts';

export interface FoldColumn {
  readonly id: string;
  readonly of: 'rows' | 'lever' | 'item' | 'count';
  /** Of the lever or item. */
  readonly index: number;
  readonly title: string;
  readonly item?: FoldItem;
  /** A rule stands before it. */
  readonly starts: boolean;
  readonly width: number;
}

export interface FoldColumns {
  readonly list: readonly FoldColumn[];
  readonly tracks: string;
  readonly width: number;
}

const CHARACTER = 7.4;
const HEAD = 9;
const PADDING = 18;
const GLYPH = 26;

/** Lever positions that a fold names: `any`, or `a/0`. */
export function sayPositions(mask: number, positions: readonly string[]): string {
  if (mask === (1 << positions.length) - 1) return 'any';
  return positions.filter((_, p) => ((mask >>> p) & 1) === 1).join('/');
}

export function foldColumns(answer: FoldAnswer): FoldColumns {
  const wide = (texts: readonly string[], title: string, extra = 0): number =>
    Math.ceil(Math.max(title.length * HEAD, ...texts.map((text) => text.length * CHARACTER + extra)) + PADDING);
  const words = (i: number): string[] => [
    ...answer.rows.map((row) => row.outcome[i] ?? ''),
    answer.otherwise.outcome[i] ?? '',
  ];
  const total = answer.combinations.toLocaleString('en').length * 8 + PADDING;
  const list: FoldColumn[] = [
    { id: 'rows', of: 'rows', index: 0, title: 'rows', starts: false, width: 124 },
    ...answer.inputs.map(({ label, positions }, index): FoldColumn => {
      const said = answer.rows.map((row) => sayPositions(row.positions[index] ?? 0, positions));
      return {
        id: `lever:${index}`,
        of: 'lever',
        index,
        title: label,
        starts: index === 0,
        width: wide([...said, ...positions], label),
      };
    }),
    ...answer.items.map((item, index): FoldColumn => ({
      id: `item:${index}`,
      of: 'item',
      index,
      title: item.label,
      item,
      starts: index === 0,
      width: wide(words(index), item.label, GLYPH),
    })),
    { id: 'count', of: 'count', index: 0, title: 'combinations', starts: true, width: Math.max(112, total) },
  ];
  // What is left over goes to the last column, so that the others stand close together.
  const tracks = list.map(({ of, width }) => (of === 'count' ? `minmax(${width}px, ${width + 20}px)` : `${width}px`));
  return { list, tracks: `${tracks.join(' ')} 1fr`, width: list.reduce((sum, { width }) => sum + width, 0) };
}
