/** 3¹⁴ rows: what a table held in memory can list. */
export const MOST_ROWS = 4_782_969;
