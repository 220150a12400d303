/** 3¹⁴ rows: what a table held in memory can list. */
export const MOST_ROWS = 4_782_969;
/** Rows of which the pressure layer solves each, or those that open paths leave to it, in the background: some tens of seconds. */
export const BACKGROUND_ROWS = 100_000;
