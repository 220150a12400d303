import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { openCircuit } from '../../../src/parts/open.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { circuit } from '../../notation.ts';
import { BleedAsked } from './asked.ts';

const example = (name: string): BleedAsked => {
  const file = fileURLToPath(new URL(`../../../examples/${name}.spool.json`, import.meta.url));
  const opened = openCircuit(readFileSync(file, 'utf8'));
  if (!opened.ok) throw new Error(`${name} does not open`);
  return new BleedAsked(opened.value);
};

const lift = (pump: string, store = ''): BleedAsked =>
  new BleedAsked(
    circuit(
      `P1 ${pump}, R1 relief-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder{bore=63 mm;rod=45 mm;load=20 kN;loadSense=pushes in}, T1 tank${store === '' ? '' : `, ${store}`}` +
        ' | P: P1.P R1.P V1.P | A: V1.A C1.A | B: V1.B C1.B | T: V1.T R1.T T1.T P1.S',
    ),
  );

describe('20 kN on a 63 mm cap, closed centre', () => {
  test('the load keeps F/A in A, and only the lever towards lower lets it down: it drops (law: F/A)', () => {
    const asked = lift('fixed-pump');
    const plan = asked.plan('V1=0');
    expect(asked.lines(plan.start)).toEqual(['A', 'B']);
    const [inA, inB] = plan.start;
    const load = inA?.reasons.find((reason) => reason.kind === 'load');
    // 20 000 N / (π/4 · 0.063² m²) = 64.16 bar.
    expect(load?.kind === 'load' && load.pressure).toBeCloseTo(64.16e5, -4);
    expect(inB?.reasons.map(({ kind }) => kind)).toEqual(['left behind']);
    // Towards raise the load would have to sink back through the pump, and that only as far as it leaks.
    expect(plan.moves.map((move) => asked.say(move))).toEqual(['V1 0>b: drop C1 in, leak B']);
    expect(plan.left).toEqual([]);
    expect(plan.proven).toBe(true);
  });

  test('at lower it comes down by itself when the pump stops', () => {
    const asked = lift('fixed-pump');
    const plan = asked.plan('V1=b');
    expect(asked.cautions(plan.stopping)).toEqual(['drop C1 in', 'leak P B']);
    expect(plan.moves).toEqual([]);
  });

  test('behind a tight pump the supply stays shut in: a bleed valve on it lets the levers do the rest', () => {
    const asked = lift('fixed-pump{tightWhenStopped=true}');
    const plan = asked.plan('V1=0');
    expect(asked.lines(plan.start)).toEqual(['P', 'A', 'B']);
    expect(plan.left.filter(({ never }) => never).map(({ line }) => asked.lines([line])[0])).toEqual(['P']);
    const points = asked.withPoints('V1=0');
    expect(asked.lines(points?.points ?? [])).toEqual(['P']);
    expect(asked.lines(points?.held ?? [])).toEqual(['A', 'B']);
    expect(points?.moves.map((move) => asked.say(move))).toHaveLength(1);
    expect(points?.left).toEqual([]);
  });
});

describe('examples', () => {
  test('grain tipper: LOWER lets the body down', () => {
    const asked = example('grain-tipper');
    const plan = asked.plan('');
    expect(asked.lines(plan.start)).toEqual(['lift']);
    // 38 kN on an 80 mm cap: 75.6 bar (law: F/A).
    expect(plan.start[0]?.reasons[0]).toMatchObject({ kind: 'load', pressure: expect.closeTo(75.6e5, -5) as number });
    expect(plan.moves.map((move) => asked.say(move))).toEqual(['LOWER rest>lower: drop BODY in']);
    expect(plan.left).toEqual([]);
  });

  test('panel clamp: with the pump stopped nothing holds the lock checks open, so no lever vents what they shut in', () => {
    const asked = example('panel-clamp');
    for (const state of ['V1=clamp', 'V1=rest', 'V1=release']) {
      const plan = asked.plan(state);
      expect(asked.lines(plan.start)).toEqual(['clamp side', 'L1.C2']);
      expect(plan.moves).toEqual([]);
      expect(plan.left.map(({ never }) => never)).toEqual([true, true]);
      const points = asked.withPoints(state);
      expect([points?.points.length, points?.moves.length, points?.left.length]).toEqual([2, 0, 0]);
    }
  });
});

describe('accumulator on the supply', () => {
  const rig = (discharge: boolean): BleedAsked =>
    new BleedAsked(
      circuit(
        `P1 fixed-pump{tightWhenStopped=true}, R1 relief-valve, T1 tank, ACC1 accumulator${discharge ? ', DV1 shut-off-valve' : ''}, V1 directional-valve:valve-4/3-shut, C1 cylinder` +
          ` | P: P1.P R1.P ACC1.A V1.P${discharge ? ' DV1.A' : ''} | A: V1.A C1.A | B: V1.B C1.B | T: V1.T R1.T T1.T P1.S${discharge ? ' DV1.B' : ''}`,
      ),
    );

  test('with a valve to discharge it: that first, then one lever lets both chambers down (published practice)', () => {
    const asked = rig(true);
    const plan = asked.plan('DV1=shut V1=0');
    expect(plan.start[0]?.reasons[0]).toEqual({ kind: 'stored', accumulator: 0 });
    expect(plan.moves.map((move) => asked.say(move))).toEqual(['DV1 shut>open: discharge ACC1', 'V1 0>a']);
    expect(plan.left).toEqual([]);
    expect(asked.cautions(asked.plan('DV1=open V1=0').stopping)).toEqual(['discharge ACC1']);
  });

  test('a shifted lever leaves the cylinder to stored oil when the pumps stop', () => {
    const asked = rig(true);
    expect(asked.cautions(asked.plan('DV1=shut V1=a').stopping)).toEqual(['driven C1 out']);
  });

  test('without one, its line is never let down', () => {
    const asked = rig(false);
    const plan = asked.plan('V1=0');
    expect(plan.left.find(({ never }) => never)).toEqual({ line: asked.net.lineOf.get('ACC1.A'), never: true });
    const points = asked.withPoints('V1=0');
    expect(asked.cautions(points?.opening ?? [])).toEqual(['discharge ACC1']);
    expect(points?.left).toEqual([]);
  });

  test('while it is charged it holds a lock check open, so it is let down last', () => {
    const asked = new BleedAsked(
      circuit(
        'P1 fixed-pump{tightWhenStopped=true}, R1 relief-valve, T1 tank, ACC1 accumulator, DV1 shut-off-valve, V1 directional-valve:valve-4/3-float, L1 lock-check, C1 single-acting-cylinder:single-acting-cylinder-load' +
          ' | P: P1.P R1.P ACC1.A V1.P DV1.A | V1.A L1.V | V1.B L1.X | A: L1.C C1.A | T: V1.T R1.T T1.T P1.S DV1.B',
      ),
    );
    const plan = asked.plan('DV1=shut V1=0');
    expect(asked.lines(plan.start)).toEqual(['P', 'A']);
    expect(plan.moves.map((move) => asked.say(move))).toEqual([
      'V1 0>b: drop C1 in, spread V1.B',
      'DV1 shut>open: discharge ACC1',
    ]);
    expect(plan.left).toEqual([]);
    // Discharged first, nothing opens the check any more.
    const late = asked.plan('DV1=open V1=0');
    expect([late.moves.length, asked.lines(late.left)]).toEqual([0, ['A']]);
  });

  test('what can be let down line by line, but not all together, is not called never', () => {
    const asked = new BleedAsked(
      circuit(
        'P1 fixed-pump{tightWhenStopped=true}, R1 relief-valve, T1 tank, ACC1 accumulator, DV1 shut-off-valve, V1 directional-valve:valve-4/3-float, L1 double-lock-check, C1 cylinder' +
          ' | P: P1.P R1.P ACC1.A V1.P DV1.A | V1.A L1.V1 | V1.B L1.V2 | A: L1.C1 C1.A | B: L1.C2 C1.B | T: V1.T R1.T T1.T P1.S DV1.B',
      ),
    );
    // Each chamber's check is opened by the line of the other, which fills the other chamber.
    const plan = asked.plan('DV1=shut V1=0');
    expect(plan.moves.map((move) => asked.say(move))).toEqual(['DV1 shut>open: discharge ACC1']);
    expect([asked.lines(plan.left), plan.left.map(({ never }) => never)]).toEqual([
      ['A', 'B'],
      [false, false],
    ]);
    const points = asked.withPoints('DV1=shut V1=0');
    expect([asked.lines(points?.points ?? []), points?.left]).toEqual([['A', 'B'], []]);
  });
});

test('pressure that a move spreads is said before it', () => {
  const asked = example('infeed-series');
  const plan = asked.plan('V1=kick V2=up');
  // The pump leaks its own line down; what stands between the valves is shut in behind the first cylinder.
  expect(asked.lines(plan.start)).toEqual(['V1.B', 'between', 'V2.A']);
  expect(plan.moves.map((move) => asked.say(move))).toEqual([
    'V2 up>hold: spread V2.B',
    'V1 kick>hold',
    'V2 hold>up: leak V2.A',
  ]);
  expect(plan.left).toEqual([]);
});

test('a plan names no row that does not exist, and stops when asked to', () => {
  const asked = lift('fixed-pump');
  expect(() => asked.plan('V1=0', { budget: { cancelled: () => true, progress: () => {} } })).toThrow('cancelled');
  expect(() => asked.powerLoss('V1=7')).toThrow('no such position');
});

/** Closed centres side by side: each needs a move of its own lever. */
const bank = (valves: number, more = '', lines = ''): Circuit => {
  const numbers = Array.from({ length: valves }, (_, i) => i + 1);
  const each = (port: string): string => numbers.map((n) => `V${n}.${port}`).join(' ');
  return circuit(
    `P1 fixed-pump, R1 relief-valve, T1 tank, ${numbers.map((n) => `V${n} directional-valve:valve-4/3-shut, C${n} cylinder`).join(', ')}${more}` +
      ` | P1.P R1.P ${each('P')} | ${numbers.map((n) => `V${n}.A C${n}.A | V${n}.B C${n}.B`).join(' | ')} | R1.T T1.T P1.S ${each('T')}${lines}`,
  );
};

test('twelve closed centres need twelve moves, and that no list is shorter is proven at once: no lever can be spared', () => {
  const plan = new BleedAsked(bank(12)).plan('', { mostStates: 2000 });
  expect([plan.start.length, plan.moves.length, plan.left.length]).toEqual([24, 12, 0]);
  expect(plan.proven).toBe(true);
});

test('a search that runs out of states says so, and still gives a list', () => {
  // No list lets down what the lock checks shut in, though moves open each line by itself: all states have to be looked at.
  const locked = new BleedAsked(
    bank(
      3,
      ', ACC1 accumulator, DV1 shut-off-valve, V7 directional-valve:valve-4/3-float, L7 double-lock-check, C7 cylinder',
      ' | V7.P P1.P ACC1.A DV1.A | V7.T T1.T DV1.B | V7.A L7.V1 | V7.B L7.V2 | L7.C1 C7.A | L7.C2 C7.B',
    ),
  );
  const short = locked.plan('DV1=shut', { mostStates: 60 });
  expect(short.proven).toBe(false);
  expect(short.left.length).toBeLessThan(short.start.length);
  const full = new BleedAsked(bank(6)).plan('');
  expect(full.proven).toBe(true);
  // One lever for each of the six closed centres.
  expect([full.start.length, full.moves.length, full.left.length]).toEqual([12, 6, 0]);
});

describe('loss of the control voltage', () => {
  test('a coil valve goes to rest and shuts its cylinder in; a lever stays', () => {
    const asked = new BleedAsked(
      circuit(
        'P1 fixed-pump, R1 relief-valve, T1 tank, V1 directional-valve:valve-4/3-shut-coils, C1 cylinder, S1 shut-off-valve, C2 cylinder' +
          ' | P: P1.P R1.P V1.P S1.A | A: V1.A C1.A | B: V1.B C1.B | X: S1.B C2.A | T: V1.T R1.T T1.T P1.S C2.B',
      ),
    );
    const loss = asked.powerLoss('V1=a S1=open');
    expect(loss.after).toBe(asked.row('V1=0 S1=open'));
    expect(loss.returned).toEqual([0]);
    // A keeps what it had, and can press B through the piston.
    expect(asked.lines(loss.running)).toEqual(['P', 'A', 'B', 'X']);
    // Stopped, the pump lets P and what is open to it down; A stays shut in.
    expect(asked.lines(loss.stopped)).toEqual(['A', 'B']);
  });
});
