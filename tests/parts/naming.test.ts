import { expect, test } from 'vitest';
import { copyOut, paste } from '../../src/circuit/build.ts';
import { applyEdit } from '../../src/circuit/edit.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { namingSettings } from '../../src/parts/naming.ts';

/** A roller valve that RAM trips, and a plan that names RAM. */
const PUSHER: Circuit = {
  name: 'Pusher',
  parts: [
    { id: 'RAM', kind: 'cylinder', at: { x: 0, y: 0 }, settings: { stroke: '200 mm' } },
    { id: 'V1', kind: 'roller-valve', at: { x: 20, y: 0 }, settings: { actuator: 'RAM', trips: 'out' } },
  ],
  connections: [],
  plans: [{ id: 'p1', name: 'Cycle', steps: [], start: { RAM: 'out' } }],
};

const pasted = (ids: readonly string[]): Circuit =>
  applyEdit(PUSHER, paste(PUSHER, copyOut(PUSHER, ids), 0, 20, namingSettings).edit);

test('the settings that name a part are known by their kind', () => {
  expect(PUSHER.parts.map(namingSettings)).toEqual([[], ['actuator']]);
});

test('a roller valve that is copied with its actuator is tripped by the copy', () => {
  const { parts, plans } = pasted(['V1', 'RAM']);
  expect(parts.map(({ id }) => id)).toEqual(['RAM', 'V1', 'RAM1', 'V2']);
  expect(parts[3]?.settings).toEqual({ actuator: 'RAM1', trips: 'out' });
  expect(parts.slice(0, 2)).toStrictEqual(PUSHER.parts);
  expect(plans).toStrictEqual(PUSHER.plans);
});

test('copied alone, it stays with the actuator that it had', () => {
  expect(pasted(['V1']).parts[2]).toMatchObject({ id: 'V2', settings: { actuator: 'RAM', trips: 'out' } });
});
