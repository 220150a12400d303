import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../src/analysis/analyse.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { BleedModel } from '../../../src/engine/sequence/bleed-model.ts';
import { planBleed } from '../../../src/engine/sequence/bleed.ts';
import type { Held } from '../../../src/engine/sequence/pressure-state.ts';
import { randomCircuit } from '../../random-circuit.ts';
import { randomMachine } from './random-machine.ts';
import { fewestLeft, shownOf, tell } from './reference.ts';
import type { Told } from './reference.ts';

/** Longest lists that are all tried. */
const MOVES = 3;

const members = (bits: Uint8Array): Set<number> => new Set([...bits.keys()].filter((i) => bits[i] === 1));
const told = (row: number, held: Held): Told => ({
  row,
  lines: members(held.lines),
  stores: members(held.stores),
  pressed: new Set([...members(held.pressed)].map((side) => `${side >> 1}${side % 2 === 0 ? 'A' : 'B'}`)),
});

interface Count {
  plans: number;
  moved: number;
  left: number;
  longest: number;
}

/** Compares the plan for one row with every list of up to MOVES moves. */
function compare(circuit: Circuit, pick: number, count: Count): void {
  const net = networkOf(circuit);
  const model = new BleedModel(net, { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) });
  const row = pick % model.states;
  const plan = planBleed(model, row);
  let now = tell(net, row, told(row, model.before(row)));
  expect(plan.start.map(({ line }) => line)).toEqual(shownOf(net, now));
  const fewest = fewestLeft(net, now, MOVES);
  for (const move of plan.moves) {
    const before = shownOf(net, now);
    const { pressed } = now;
    now = tell(net, move.row, now);
    const down = [...pressed].filter((side) => !now.pressed.has(side)).map((side) => parseInt(side, 10));
    const told = move.cautions.flatMap((caution) => (caution.kind === 'drop' ? [caution.actuator] : []));
    expect(told).toEqual(expect.arrayContaining(down));
    expect(move.held).toEqual(shownOf(net, now));
    expect(move.vents).toEqual(before.filter((line) => !move.held.includes(line)));
  }
  expect(plan.proven).toBe(true);
  expect(plan.left.map(({ line }) => line)).toEqual(shownOf(net, now));
  // No list of up to MOVES moves leaves fewer, and no shorter one leaves as few.
  expect(Math.min(...fewest)).toBeGreaterThanOrEqual(plan.left.length);
  const first = fewest.findIndex((left) => left === plan.left.length);
  expect(first).toBe(plan.moves.length <= MOVES ? plan.moves.length : -1);
  count.plans += 1;
  if (plan.moves.length > 0) count.moved += 1;
  if (plan.left.length > 0) count.left += 1;
  count.longest = Math.max(count.longest, plan.moves.length);
}

test.each([
  ['circuits joined at random', randomCircuit(3), 300, { moved: 5, left: 5 }],
  ['machines with loads and checks', randomMachine(), 350, { moved: 150, left: 100 }],
])(`plans agree with every list of up to ${MOVES} moves: %s`, (_, circuits, numRuns, atLeast) => {
  const count: Count = { plans: 0, moved: 0, left: 0, longest: 0 };
  fc.assert(
    fc.property(circuits, fc.nat(), (drawn, pick) => compare(drawn, pick, count)),
    { numRuns, seed: 20261201 },
  );
  // The sample must hold work to do, and cases that no list ends.
  expect(count.plans).toBe(numRuns);
  expect(count.moved).toBeGreaterThan(atLeast.moved);
  expect(count.left).toBeGreaterThan(atLeast.left);
});
