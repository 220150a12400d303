import { expect, test } from 'vitest';
import { joinEnds } from '../../../src/app/sheet/connecting.ts';
import type { End } from '../../../src/app/sheet/desk.svelte.ts';
import { hitAt } from '../../../src/app/sheet/hit.ts';
import type { HitMap } from '../../../src/app/sheet/hit.ts';
import { litSheets } from '../../../src/app/sheet/lit-sheets.ts';
import { placeOf, readingOrder } from '../../../src/app/sheet/reading-order.ts';
import { applyEdit } from '../../../src/circuit/edit.ts';
import type { Circuit } from '../../../src/circuit/model.ts';

const RIG: Circuit = {
  name: 'Rig',
  sheets: [
    { id: 's1', name: 'Power unit' },
    { id: 's2', name: 'Stations' },
  ],
  parts: [
    { id: 'PU', kind: 'fixed-pump', at: { x: 0, y: 20 } },
    { id: 'G1', kind: 'gauge', at: { x: 10, y: 0 } },
    { id: 'G2', kind: 'gauge', sheet: 's2', at: { x: 10, y: 0 } },
    { id: 'G3', kind: 'gauge', sheet: 's2', at: { x: 20, y: 0 } },
  ],
  connections: [
    { id: 'c1', from: { part: 'PU', port: 'P' }, to: { part: 'G1', port: 'M' } },
    { id: 'c2', from: { part: 'PU', port: 'P' }, to: { part: 'G2', port: 'M' } },
  ],
};
const LINES = [{ connections: ['c1', 'c2'] }];

test('sheets are lit by parts, and by lines wherever a connection of them is', () => {
  expect([...litSheets(RIG, { parts: ['G3'], lines: [] }, LINES)]).toEqual(['s2']);
  expect([...litSheets(RIG, { parts: [], lines: [0] }, LINES)].sort()).toEqual(['s1', 's2']);
  expect([...litSheets(RIG, { parts: [], lines: [], steps: [{ parts: ['PU'], lines: [] }] }, LINES)]).toEqual(['s1']);
  expect(litSheets({ ...RIG, sheets: [{ id: 's1', name: 'One' }] }, { parts: ['PU'], lines: [0] }, LINES).size).toBe(0);
});

const MAP: HitMap = {
  parts: [{ id: 'PU', box: { x: 0, y: 0, width: 6, height: 6 } }],
  references: [{ id: 'c2:from', box: { x: 10, y: 0, width: 6, height: 3 } }],
  ports: [{ part: 'PU', port: 'P', at: { x: 3, y: 0 }, side: 'up', joint: false }],
  routes: [
    {
      id: 'c2',
      points: [
        { x: 3, y: 0 },
        { x: 10, y: 1 },
      ],
    },
  ],
};

test('a reference is hit before the line that ends at it, and is gone to after the lines', () => {
  expect(hitAt(MAP, { x: 11, y: 1 }, 1)).toEqual({ type: 'reference', id: 'c2:from' });
  expect(hitAt(MAP, { x: 7, y: 0.6 }, 1)).toMatchObject({ type: 'connection', id: 'c2' });
  expect(readingOrder(MAP, false).map(({ type }) => type)).toEqual(['part', 'port', 'connection', 'reference']);
  expect(placeOf(MAP, { type: 'reference', id: 'c2:from' })).toEqual({ x: 13, y: 1.5 });
});

test('a line that ends on a line between two sheets has its junction on the sheet where it ended', () => {
  const from: End = {
    type: 'port',
    ref: { part: 'G3', port: 'M' },
    at: { x: 20, y: 3 },
    side: 'down',
    sheet: 's2',
  };
  const joint = (sheet: string): Circuit['parts'][number] | undefined =>
    applyEdit(RIG, joinEnds(RIG, from, { type: 'line', connection: 'c2', at: { x: 10, y: 5 }, sheet })).parts.at(-1);
  expect(joint('s2')).toMatchObject({ kind: 'junction', sheet: 's2' });
  expect(joint('s1')).toMatchObject({ kind: 'junction' });
  expect(joint('s1')).not.toHaveProperty('sheet');
});
