import type { Point } from '../../base/points.ts';
import { distance } from './hit.ts';
import type { HitMap } from './hit.ts';

/** Where the keyboard stands on the sheet. */
export type Cursor =
  | { readonly type: 'part'; readonly id: string }
  | { readonly type: 'port'; readonly part: string; readonly port: string }
  | { readonly type: 'connection'; readonly id: string }
  | { readonly type: 'reference'; readonly id: string }
  | { readonly type: 'label'; readonly id: string };

/** Parts whose tops differ by less stand in one row. */
const ROW = 6;

/** Parts in rows from the top, each followed by its ports; then lines, references and texts. Without parts while a line is drawn. */
export function readingOrder(map: HitMap, ends: boolean): Cursor[] {
  const rows = [...map.parts].sort((a, b) => a.box.y - b.box.y);
  const order: typeof rows = [];
  let row: typeof rows = [];
  const close = (): void => {
    order.push(...row.sort((a, b) => a.box.x - b.box.x));
    row = [];
  };
  for (const part of rows) {
    const first = row[0];
    if (first && part.box.y - first.box.y > ROW) close();
    row.push(part);
  }
  close();
  const ports = new Map<string, Cursor[]>();
  for (const port of map.ports) {
    const list = ports.get(port.part) ?? [];
    list.push({ type: 'port', part: port.part, port: port.port });
    ports.set(port.part, list);
  }
  return [
    ...order.flatMap(({ id }): Cursor[] => [
      ...(ends ? [] : [{ type: 'part' as const, id }]),
      ...(ports.get(id) ?? []),
    ]),
    ...map.routes.map(({ id }): Cursor => ({ type: 'connection', id })),
    ...(map.references ?? []).map(({ id }): Cursor => ({ type: 'reference', id })),
    ...(ends ? [] : (map.labels ?? []).map(({ id }): Cursor => ({ type: 'label', id }))),
  ];
}

export const sameCursor = (a: Cursor | undefined, b: Cursor | undefined): boolean => keyOf(a) === keyOf(b);

/** Also the id of the element on the page. */
export function keyOf(cursor: Cursor | undefined): string {
  if (!cursor) return '';
  return cursor.type === 'port' ? `sheet-port-${cursor.part}.${cursor.port}` : `sheet-${cursor.type}-${cursor.id}`;
}

/** The thing after (or before) the cursor; undefined past the end. From nowhere: the first or the last. */
export function stepFrom(order: readonly Cursor[], from: Cursor | undefined, by: 1 | -1): Cursor | undefined {
  const at = from ? order.findIndex((each) => sameCursor(each, from)) : -1;
  if (at < 0) return by === 1 ? order[0] : order.at(-1);
  return order[at + by];
}

/** Where a thing is, for spatial moves: the middle of a line's longest stretch. */
export function placeOf(map: HitMap, cursor: Cursor): Point | undefined {
  if (cursor.type === 'port') return map.ports.find((p) => p.part === cursor.part && p.port === cursor.port)?.at;
  if (cursor.type === 'part') {
    const box = map.parts.find((p) => p.id === cursor.id)?.box;
    return box && { x: box.x + box.width / 2, y: box.y + box.height / 2 };
  }
  if (cursor.type === 'label' || cursor.type === 'reference') {
    const list = cursor.type === 'label' ? map.labels : map.references;
    const box = list?.find((each) => each.id === cursor.id)?.box;
    return box && { x: box.x + box.width / 2, y: box.y + box.height / 2 };
  }
  const points = map.routes.find((r) => r.id === cursor.id)?.points ?? [];
  let best: Point | undefined;
  let longest = -1;
  for (let i = 0; i + 1 < points.length; i++) {
    const a = points[i] as Point;
    const b = points[i + 1] as Point;
    const length = distance(a, b);
    if (length > longest) {
      longest = length;
      best = { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 };
    }
  }
  return best;
}

/** The nearest port in that direction: straight ahead counts more than aside. */
export function portTowards(map: HitMap, from: Point, dx: number, dy: number): Cursor | undefined {
  let best: Cursor | undefined;
  let least = Infinity;
  const length = Math.hypot(dx, dy) || 1;
  for (const port of map.ports) {
    const ahead = ((port.at.x - from.x) * dx + (port.at.y - from.y) * dy) / length;
    const aside = Math.abs((port.at.x - from.x) * dy - (port.at.y - from.y) * dx) / length;
    if (ahead < 0.25 || aside > ahead * 2) continue;
    const cost = ahead + 2 * aside;
    if (cost < least) {
      least = cost;
      best = { type: 'port', part: port.part, port: port.port };
    }
  }
  return best;
}
