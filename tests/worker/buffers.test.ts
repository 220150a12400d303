import { expect, test } from 'vitest';
import { networkOf } from '../../src/analysis/analyse.ts';
import { unlimited } from '../../src/base/budget.ts';
import { tabulate } from '../../src/engine/table/tabulate.ts';
import { planeBuffers } from '../../src/worker/buffers.ts';
import { family } from '../bench/circuits.ts';

test('a table changes threads without a copy, equal planes still in one piece of memory', () => {
  const net = networkOf(family('MIX', 6));
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  for (const pressureRows of [0, 20]) {
    const data = tabulate(net, conditions, unlimited, { pressureRows });
    const before = structuredClone(data);
    const buffers = planeBuffers(data);
    const sent = structuredClone(data, { transfer: buffers });
    expect(sent).toEqual(before);
    expect(buffers.length).toBeGreaterThan(10);
    expect(buffers.every((buffer) => buffer.byteLength === 0)).toBe(true);
    expect(planeBuffers(sent)).toHaveLength(buffers.length);
  }
});
