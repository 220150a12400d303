import type { Box } from '../base/points.ts';

/** Modules: side of a cell. */
const CELL = 16;
/** Cells to either side of the origin that a key tells apart. */
const HALF = 2 ** 20;

interface Entry<T> {
  readonly box: Box;
  readonly item: T;
  /** The question that it was last found by. */
  asked: number;
}

/** Finds things on the sheet by where they are, without looking at all of them: they lie in the cells of a grid. */
export class Near<T> {
  readonly #cells = new Map<number, Entry<T>[]>();
  #asked = 0;

  add(box: Box, item: T): void {
    const entry: Entry<T> = { box, item, asked: 0 };
    for (const key of keysOf(box)) {
      const cell = this.#cells.get(key);
      if (cell) cell.push(entry);
      else this.#cells.set(key, [entry]);
    }
  }

  /** Whatever shares a point with the box, be it on an edge; in no particular order, each once. */
  touching(box: Box): T[] {
    const asked = ++this.#asked;
    const out: T[] = [];
    for (const key of keysOf(box)) {
      for (const entry of this.#cells.get(key) ?? []) {
        if (entry.asked === asked) continue;
        entry.asked = asked;
        const other = entry.box;
        const apart =
          other.x > box.x + box.width ||
          box.x > other.x + other.width ||
          other.y > box.y + box.height ||
          box.y > other.y + other.height;
        if (!apart) out.push(entry.item);
      }
    }
    return out;
  }
}

function* keysOf({ x, y, width, height }: Box): Generator<number> {
  const [left, right] = [Math.floor(x / CELL), Math.floor((x + width) / CELL)];
  const [top, bottom] = [Math.floor(y / CELL), Math.floor((y + height) / CELL)];
  for (let j = top; j <= bottom; j++) for (let i = left; i <= right; i++) yield (j + HALF) * 2 * HALF + i + HALF;
}
