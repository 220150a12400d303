import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { networkOf } from '../../src/analysis/analyse.ts';
import { PressureSolver } from '../../src/engine/table/resolve.ts';
import { rowNumbers } from '../../src/engine/table/row-numbers.ts';
import { openCircuit } from '../../src/parts/open.ts';

const BAR = 1e5;
const CM2 = 1e-4;
const LPM = 1e-3 / 60;

interface Row {
  readonly speed: number;
  readonly bar: (line: string) => number;
  readonly delivered: number;
  readonly spilled: number;
}

/** One cylinder, one lever, one pump, one relief: the numbers of a position, running, between its stops. */
function row(name: string, position: string): Row {
  const opened = openCircuit(readFileSync(new URL(`../../examples/${name}.spool.json`, import.meta.url), 'utf8'));
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems));
  const net = networkOf(opened.value);
  const at = net.inputs[0]?.positions.indexOf(position) ?? -1;
  if (at < 0) throw new Error(`No position ${position}`);
  const numbers = rowNumbers(new PressureSolver(net, { pumpsRunning: true, places: ['between'] }), at);
  expect(numbers.status).toBe('solved');
  return {
    speed: numbers.actuators[0]?.speed ?? Number.NaN,
    bar: (line) => (numbers.lines[net.lines.findIndex((each) => each.name === line)] ?? Number.NaN) / BAR,
    delivered: (numbers.pumps[0]?.delivered ?? Number.NaN) / LPM,
    spilled: (numbers.reliefs[0]?.flow ?? Number.NaN) / LPM,
  };
}

const within = (value: number, expected: number, share: number): void =>
  expect(Math.abs(value - expected), `${value} against ${expected}`).toBeLessThan(share * Math.abs(expected));

// Areas from the bores and rods in the files (law: v = q/A); losses of lines and valves give the room.
describe('speeds of the examples, worked by hand', () => {
  test('stone saw: 6 L/min on 31.17 cm², the other 24 over relief; back with all 30 on 20.99 cm²', () => {
    const feed = row('stone-saw', 'feed');
    within(feed.speed, (6 * LPM) / (31.17 * CM2), 1e-3);
    within(feed.spilled, 24, 1e-3);
    within(row('stone-saw', 'back').speed, (-30 * LPM) / (20.99 * CM2), 1e-3);
  });

  test('tub tipper: the rod side stands above supply times 19.63/13.48, and its throttle sets the speed', () => {
    const tip = row('tub-tipper', 'tip');
    // Pulled by 7 kN, less 0.2 kN of friction.
    within(tip.bar('metered'), (tip.bar('tip') * 19.63 + 680) / 13.48, 2e-3);
    expect(tip.bar('metered')).toBeGreaterThan(200);
    within(tip.speed, (4 * LPM * Math.sqrt((tip.bar('metered') - tip.bar('V1.B')) / 60)) / (13.48 * CM2), 2e-3);
    expect(tip.spilled).toBeGreaterThan(5);
  });

  test('hop press: 44 bar on the throttle take 7.5 of the 18 L/min; nothing goes over relief', () => {
    const press = row('hop-press', 'press');
    within(press.bar('press'), 44.2, 0.02);
    within(press.speed, (10.5 * LPM) / (50.27 * CM2), 0.02);
    expect(press.spilled).toBe(0);
  });

  test('stage lift: down at 25 L/min on 25.64 cm², no faster, with pressure on the rod side; up on 50.27 cm²', () => {
    const lower = row('stage-lift', 'lower');
    within(lower.speed, (-25 * LPM) / (25.64 * CM2), 1e-3);
    expect(lower.bar('rod side')).toBeGreaterThan(5);
    within(row('stage-lift', 'raise').speed, (25 * LPM) / (50.27 * CM2), 1e-3);
    const hold = row('stage-lift', 'hold');
    expect(Math.abs(hold.speed)).toBeLessThan(1e-6);
    // Held by 50 kN less what friction carries.
    within(hold.bar('load'), 99.5, 5e-3);
  });
});
