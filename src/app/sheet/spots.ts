import type { Point } from '../../base/points.ts';
import { desk } from './desk.svelte.ts';
import { commitShift, middleOfView, placeNow, putDown, putDownSeveral, writeAt } from './hand.ts';

/** What has a place that can be typed: what is in hand, else the first thing that is selected. */
export function spotInHand(): Point | undefined {
  const { gesture } = desk;
  if (gesture.type === 'place' || gesture.type === 'place-several' || gesture.type === 'text')
    return gesture.at ?? middleOfView();
  return placeNow();
}

/** Opens the field in which a place is typed. `begun`: what is typed already. */
export function typeSpot(begun?: string): void {
  const at = spotInHand();
  if (!at) return desk.refuse('Select a part or a text first, or take a part in hand.');
  desk.naming = { of: 'spot', id: '', at, ...(begun !== undefined && { begun }) };
}

/** What is in hand is put down there; what is selected moves there as a whole, by its first thing. */
export function takeSpot(to: Point): void {
  const { gesture } = desk;
  if (gesture.type === 'place') return putDown(to);
  if (gesture.type === 'place-several') return putDownSeveral(to);
  if (gesture.type === 'text') return writeAt(to);
  const from = spotInHand();
  if (from) commitShift(to.x - from.x, to.y - from.y, undefined);
}
