/** Height of the bench when nobody has dragged it: one row of slots, px. */
export const SLOT_HEIGHT = 96;
const LEAST_SHEET = 120;
const LEAST_BENCH = 64;
const LEAST_TABLE = 98;

export interface Bands {
  readonly sheet: number;
  readonly minSheet: number;
  readonly maxSheet: number;
  readonly bench: number;
  readonly minBench: number;
  readonly maxBench: number;
}

/** Heights in px. `share`: of the whole height, for the sheet; `benchHeight` 0 = as its slots need. */
export function layBands(height: number, share: number, benchHeight: number): Bands {
  const wanted = benchHeight === 0 ? SLOT_HEIGHT : benchHeight;
  const room = Math.max(0, height - 2);
  const bench = Math.max(LEAST_BENCH, Math.min(wanted, room - LEAST_SHEET - LEAST_TABLE));
  const maxSheet = Math.max(LEAST_SHEET, room - bench - LEAST_TABLE);
  const sheet = Math.round(Math.min(Math.max(share * height, LEAST_SHEET), maxSheet));
  return {
    sheet,
    minSheet: LEAST_SHEET,
    maxSheet,
    bench,
    minBench: LEAST_BENCH,
    maxBench: Math.max(LEAST_BENCH, room - sheet - LEAST_TABLE),
  };
}
