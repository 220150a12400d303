import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { numbersOf, tabulate } from '../../../src/analysis/analyse.ts';
import { trueChevrons } from '../../../src/app/sheet/chevrons.ts';
import { realFlows } from '../../../src/app/sheet/real-flows.ts';
import { speedsAssumed, assumedIn } from '../../../src/app/state/assumed.ts';
import { unlimited } from '../../../src/base/budget.ts';
import { routeAll } from '../../../src/drawing/routing.ts';
import { buildScene } from '../../../src/drawing/scene.ts';
import { StateTable } from '../../../src/engine/table/state-table.ts';
import { openCircuit } from '../../../src/parts/open.ts';

const opened = openCircuit(readFileSync(new URL('../../../examples/log-deck.spool.json', import.meta.url), 'utf8'));
if (!opened.ok) throw new Error('the worked circuit does not open');
const circuit = opened.value;
const conditions = { pumps: 'running' } as const;
const table = new StateTable(tabulate(circuit, conditions, unlimited));
/** V1 shut, V2 hold, V3 stop: the main pump runs to tank through both bypasses. */
const ROW = table.rowOf([0, 1, 1]);
const [numbers] = numbersOf(circuit, conditions, [ROW]);
if (!numbers) throw new Error('no figures');
const flows = realFlows(circuit, table, numbers);

test('the whole delivery of 20 L/min runs along the lines to tank, from port to port', () => {
  const whole = 20e-3 / 60;
  // From the pump to the filter, on through both valves, to the tank.
  for (const id of ['c11', 'c12', 'c14', 'c18', 'c21']) {
    expect((flows.get(id)?.flow ?? NaN) / whole, id).toBeGreaterThan(0.999);
    expect((flows.get(id)?.flow ?? NaN) / whole, id).toBeLessThan(1.001);
  }
});

test('nothing runs to a gauge', () => {
  const gauge = flows.get('c15');
  expect(Math.abs(gauge?.flow ?? NaN)).toBeLessThanOrEqual(gauge?.still ?? 0);
});

test('on the branch to a shut relief valve, which two connections share there and back, no mark is drawn', () => {
  const routes = routeAll(circuit);
  const looks = new Map(circuit.connections.map(({ id }) => [id, { class: 'flows to tank', flow: 'forward' } as const]));
  const scene = buildScene(circuit, routes, { lines: looks, parts: new Map() });
  const marks = (lines: typeof scene.lines): { x: number; y: number }[] =>
    lines
      .filter(({ connection }) => connection === 'c11' || connection === 'c12')
      .flatMap(({ strokes }) => strokes.filter(({ role }) => role === 'chevron'))
      .flatMap(({ lines: each }) => each.map(([, tip]) => tip ?? { x: NaN, y: NaN }));
  // The relief valve stands at x = 62, pump and filter at x = 50.
  expect(marks(scene.lines).some(({ x }) => x > 53)).toBe(true);
  const kept = marks(trueChevrons(scene.lines, routes, flows));
  expect(kept.filter(({ x }) => x > 53)).toEqual([]);
});

test('a mark that runs the wrong way is turned', () => {
  const routes = new Map([['c', [{ x: 0, y: 0 }, { x: 6, y: 0 }]]]);
  const line = { connection: 'c', line: 0, points: routes.get('c') ?? [], strokes: [
    { role: 'chevron' as const, lines: [[{ x: 2.6, y: -0.6 }, { x: 3.4, y: 0 }, { x: 2.6, y: 0.6 }]], colour: 'flows-to-tank' as const, weight: 2, cap: 'butt' as const },
  ] };
  const [turned] = trueChevrons([line], routes, new Map([['c', { flow: -1, still: 0.1 }]]));
  const tip = turned?.strokes[0]?.lines[0]?.[1];
  expect(tip?.x).toBeCloseTo(2.6);
  const [kept] = trueChevrons([line], routes, new Map([['c', { flow: 1, still: 0.1 }]]));
  expect(kept?.strokes[0]?.lines[0]?.[1]?.x).toBeCloseTo(3.4);
});

test('a speed by a whole delivery rests on sizes alone; with a size that nobody entered it is assumed', () => {
  const clamp = table.data.actuators.findIndex(({ part }) => part === 'CLAMP');
  expect(speedsAssumed(assumedIn(circuit), table, numbers)[clamp]).toBe(false);
  const unsized = circuit.parts.map((part) => (part.id === 'CLAMP' ? { ...part, settings: { rod: '28 mm', stroke: '80 mm' } } : part));
  expect(speedsAssumed(assumedIn({ ...circuit, parts: unsized }), table, numbers)[clamp]).toBe(true);
});
