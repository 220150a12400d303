import type { Point } from '../../base/points.ts';

/** Where something stands, as typed and read out: modules to the right and down, as on the rulers. */
export const saySpot = ({ x, y }: Point): string => `${x}, ${y}`;

/** `20, 38`, also with a blank, a semicolon or a true minus; undefined if it is no place of the grid. */
export function parseSpot(text: string): Point | undefined {
  const found = /^\s*([-−]?\d{1,6})\s*(?:[,;]|\s)\s*([-−]?\d{1,6})\s*$/.exec(text);
  if (!found) return undefined;
  const [x, y] = [found[1], found[2]].map((each) => Number(each?.replace('−', '-')) + 0);
  return x === undefined || y === undefined ? undefined : { x, y };
}
