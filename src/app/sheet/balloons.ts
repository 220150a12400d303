import type { Point } from '../../base/points.ts';
import type { LitStep } from '../state/session.svelte.ts';
import type { HitMap } from './hit.ts';
import { placeOf } from './reading-order.ts';

export interface Balloon {
  readonly number: number;
  readonly at: Point;
  readonly current: boolean;
}

/** Modules between the middles of two balloons. */
const APART = 2.4;

/** One balloon for each step, at its first part or else on its first line; those that would meet stand below one another. */
export function balloons(steps: readonly LitStep[], map: HitMap, lines: readonly { readonly connections: readonly string[] }[]): Balloon[] {
  const out: Balloon[] = [];
  for (const { number, parts, lines: own, current } of steps) {
    const at = atPart(map, parts) ?? onLine(map, own.flatMap((line) => lines[line]?.connections ?? []));
    if (at) out.push({ number, at: free(at, out), current });
  }
  return out;
}

function atPart(map: HitMap, ids: readonly string[]): Point | undefined {
  for (const id of ids) {
    const box = map.parts.find((part) => part.id === id)?.box;
    if (box) return { x: box.x - 1.3, y: box.y + 1 };
  }
  return undefined;
}

function onLine(map: HitMap, connections: readonly string[]): Point | undefined {
  for (const id of connections) {
    const at = placeOf(map, { type: 'connection', id });
    if (at) return { x: at.x + 1.2, y: at.y - 1.2 };
  }
  return undefined;
}

function free(at: Point, taken: readonly Balloon[]): Point {
  let spot = at;
  while (taken.some((other) => Math.hypot(other.at.x - spot.x, other.at.y - spot.y) < APART)) spot = { x: spot.x, y: spot.y + APART };
  return spot;
}
