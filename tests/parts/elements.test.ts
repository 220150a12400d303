import { expect, test } from 'vitest';
import type { Part, Setting } from '../../src/circuit/model.ts';
import { ENTRIES } from '../../src/parts/catalogue.ts';
import type { Element } from '../../src/parts/contract.ts';
import { needKind } from './need.ts';

const partOf = (kind: string, settings: Readonly<Record<string, Setting>> = {}): Part => ({ id: 'X', kind, settings });
const elements = (kind: string, settings?: Readonly<Record<string, Setting>>): readonly Element[] =>
  needKind(kind).elements(partOf(kind, settings));
const paths = (kind: string, settings?: Readonly<Record<string, Setting>>): string[] =>
  elements(kind, settings).map((element) => {
    if (element.type !== 'path') return element.type;
    const sign = `${element.throttled ? '~' : ''}${element.way === 'one-way' ? '>' : element.throttled ? '' : '-'}`;
    return `${element.from}${sign}${element.to}${element.pilot ? ` by ${element.pilot.port}×${element.pilot.ratio}` : ''}${element.vent ? ` while ${element.vent} is let down` : ''}`;
  });

test('pumps carry flow and setting in SI', () => {
  expect(elements('fixed-pump', { flow: '60 L/min' })).toEqual([
    { type: 'pump', outlet: 'P', suction: 'S', form: 'fixed', flow: 1e-3, tightWhenStopped: false },
  ]);
  expect(elements('compensated-pump', { flow: '60 L/min', setting: '210 bar', tightWhenStopped: true })).toEqual([
    {
      type: 'pump',
      outlet: 'P',
      suction: 'S',
      form: 'compensated',
      flow: 1e-3,
      setting: 210e5,
      tightWhenStopped: true,
    },
  ]);
});

test('a relief valve opens from P to T at its setting', () => {
  expect(elements('relief-valve', { setting: '180 bar' })).toMatchObject([
    { type: 'pressure-opened', from: 'P', to: 'T', setting: 180e5, duty: 'relief' },
  ]);
});

test('checks let oil through one way', () => {
  expect(paths('check-valve')).toEqual(['A>B']);
  expect(elements('check-valve', { cracking: '5 bar' })).toMatchObject([{ cracking: 5e5 }]);
  expect(paths('lock-check')).toEqual(['V>C', 'C>V by X×3']);
  expect(paths('double-lock-check', { ratio: 4 })).toEqual(['V1>C1', 'C1>V1 by V2×4', 'V2>C2', 'C2>V2 by V1×4']);
});

test('pressure valves name what opens them, the drain counting negative', () => {
  const rated = { flow: 1e-3, drop: 2e5 };
  const law = { ratedFlow: '60 L/min', ratedDrop: '2 bar', fullFlowRise: '4 bar' };
  const valve = (
    duty: string,
    from: string,
    to: string,
    setting: number,
    signals: Readonly<Record<string, number>>,
  ) => ({
    type: 'pressure-valve',
    duty,
    from,
    to,
    setting,
    signals: Object.entries(signals).map(([port, factor]) => ({ port, factor })),
    override: { rise: 4e5, flow: 1e-3 },
    rated,
  });
  const back = (from: string, to: string) => ({ type: 'path', from, to, way: 'one-way', throttled: false, rated });
  expect(elements('sequence-valve', { ...law, setting: '70 bar' })).toEqual([
    valve('sequence', 'P', 'A', 70e5, { P: 1, Y: -1 }),
  ]);
  expect(elements('sequence-valve', { ...law, drain: 'internal', bypass: true })).toEqual([
    valve('sequence', 'P', 'A', 60e5, { P: 1, A: -1 }),
    back('A', 'P'),
  ]);
  expect(elements('unloading-valve', law)).toEqual([valve('unloading', 'P', 'T', 100e5, { X: 1, T: -1 })]);
  expect(elements('counterbalance-valve', { ...law, ratio: 4 })).toEqual([
    valve('counterbalance', 'C', 'V', 150e5, { C: 1, X: 4, V: -5 }),
    back('V', 'C'),
  ]);
  expect(elements('counterbalance-valve', { ...law, springChamber: 'vented' })[0]).toEqual(
    valve('counterbalance', 'C', 'V', 150e5, { C: 1, X: 3 }),
  );
  expect(elements('reducing-valve', { ...law, relieving: true, bypass: true })).toEqual([
    valve('closes', 'P', 'A', 50e5, { A: 1, Y: -1 }),
    valve('sequence', 'A', 'Y', 50e5, { A: 1, Y: -1 }),
    back('A', 'P'),
  ]);
});

test('a sequence valve drained inside has no port Y', () => {
  const ids = (settings: Readonly<Record<string, Setting>>) =>
    needKind('sequence-valve')
      .ports(partOf('sequence-valve', settings))
      .map((port) => port.id);
  expect(ids({})).toEqual(['P', 'A', 'Y']);
  expect(ids({ drain: 'internal' })).toEqual(['P', 'A']);
});

test('a flow control is a throttle with a limit one way; a shuttle lets both inlets to its outlet, and back', () => {
  expect(elements('flow-control', { flow: '12 L/min', leastDrop: '8 bar' })).toEqual([
    { type: 'path', from: 'A', to: 'B', way: 'both', throttled: true, limit: 2e-4, rated: { flow: 2e-4, drop: 8e5 } },
  ]);
  expect(paths('flow-control', { reverseCheck: true })).toEqual(['A~B', 'B>A']);
  expect(paths('shuttle-valve')).toEqual(['X>A', 'A>X while Y is let down', 'Y>A', 'A>Y while X is let down']);
});

test('throttles, open and screwed shut', () => {
  expect(paths('throttle')).toEqual(['A~B']);
  expect(paths('throttle', { shut: true })).toEqual([]);
  expect(paths('one-way-throttle')).toEqual(['A~B', 'A>B']);
  expect(paths('one-way-throttle', { shut: true })).toEqual(['A>B']);
});

test('a filter is open both ways, with a check beside it if fitted', () => {
  expect(paths('filter')).toEqual(['A-B']);
  expect(paths('filter', { bypass: true })).toEqual(['A-B', 'A>B']);
});

test.each([
  ['shut-off-valve', ['open', 'shut'], 'hand'],
  ['quick-coupling', ['joined', 'apart'], 'coupling'],
])('%s is an input that stays where it is left', (kind, positions, by) => {
  expect(needKind(kind).input?.(partOf(kind))).toEqual({ positions, by, coils: [] });
  expect(elements(kind)).toMatchObject([{ from: 'A', to: 'B', way: 'both', positions: [0] }]);
});

test('an accumulator is charged unless said otherwise', () => {
  expect(elements('accumulator')).toMatchObject([{ type: 'accumulator', port: 'A', charged: true }]);
  expect(elements('accumulator', { charge: 'empty' })).toMatchObject([{ charged: false }]);
});

test('plug, gauge and junction let nothing through of themselves', () => {
  for (const kind of ['plug', 'gauge', 'junction']) expect(elements(kind)).toEqual([]);
});

test('only valves, shut-offs and couplings are inputs', () => {
  const inputs = ['directional-valve', 'shut-off-valve', 'quick-coupling'];
  for (const kind of ['fixed-pump', 'relief-valve', 'cylinder', 'lock-check', 'throttle'])
    expect(needKind(kind).input).toBeUndefined();
  for (const kind of inputs) expect(needKind(kind).input?.(partOf(kind))).toBeDefined();
});

test('ports left open say what that means and what to do', () => {
  const open = (kind: string, id: string) =>
    needKind(kind)
      .ports(partOf(kind))
      .find((port) => port.id === id)?.leftOpen;
  expect(open('fixed-pump', 'S')).toMatchObject({
    level: 'caution',
    what: expect.stringContaining('no suction line') as string,
  });
  expect(open('fixed-pump', 'P')).toMatchObject({ level: 'danger' });
  expect(open('relief-valve', 'T')).toMatchObject({
    level: 'danger',
    what: expect.stringContaining('plugged') as string,
  });
  expect(open('lock-check', 'X')).toMatchObject({
    level: 'caution',
    what: expect.stringContaining('never opens') as string,
  });
});

test('every path takes a rated flow and drop from the settings of its part', () => {
  for (const { kind, readyMade } of ENTRIES) {
    const bare = { id: 'X1', kind: kind.kind, ...readyMade.make() };
    const halved = Object.fromEntries(
      kind.settings.flatMap(({ id, value }) =>
        value.type === 'quantity' && value.quantity === 'flow' ? [[id, '0.5 L/min']] : [],
      ),
    );
    const paths = (part: typeof bare): (number | undefined)[] =>
      kind.elements(part).flatMap((element) => (element.type === 'path' ? [element.rated?.flow] : []));
    const changed = paths({ ...bare, settings: { ...bare.settings, ...halved } });
    paths(bare).forEach((flow, i) => {
      expect(flow, `${readyMade.id} path ${i}`).toBeGreaterThan(0);
      // The bore of a pilot stage comes with the valve; nobody rates it.
      if (kind.kind !== 'pilot-relief-valve') expect(changed[i], `${readyMade.id} path ${i}`).not.toBe(flow);
    });
  }
});
