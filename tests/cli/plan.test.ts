import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { spooltable } from './spooltable.ts';

const example = (name: string): string => fileURLToPath(new URL(`../../examples/${name}.spool.json`, import.meta.url));

test('a plan that does what it says ends with 0, and has a row for each step', async () => {
  const { code, out, err } = await spooltable(['plan', example('peg-drill')]);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toMatch(/^Plan Drill a peg: does what it says$/m);
  expect(out).toMatch(
    /^1 clamp and drill +V1\.a +CLAMP\+ DRILL\+ +CLAMP\+ 0 to 0\.7069 s, DRILL\+ 0\.7069 to 1\.272 s/m,
  );
  expect(out).toMatch(/^Loss of power$/m);
});

test('one that does not ends with 1 and says what to do; --plan takes its twin by name or id', async () => {
  const file = example('crate-pusher');
  const both = await spooltable(['plan', file]);
  expect(both.code).toBe(1);
  expect(both.out).toMatch(/^Fault, step 3: Coils a and b of V2 are on together[^\n]*\n {2}Switch one of them off/m);
  expect(both.out).toMatch(/^4 lower .* not played/m);
  for (const name of ['Corrected', 'right']) {
    const right = await spooltable(['plan', file, '--plan', name]);
    expect(right.code).toBe(0);
    expect(right.out).not.toMatch(/As first wired/);
  }
}, 30_000);

test('JSON is in SI, with every event', async () => {
  const { code, out } = await spooltable(['plan', example('peg-drill'), '--format', 'json']);
  expect(code).toBe(0);
  const { plans } = JSON.parse(out) as { plans: { time: number; trace: { samples: { time: number }[] } }[] };
  expect(plans[0]?.time).toBeCloseTo(3.901, 3);
  expect(plans[0]?.trace.samples.length).toBeGreaterThan(5);
});

test.each([
  [['plan', example('log-deck')], /The circuit has no step plan\. Add one under "plans"/],
  [
    ['plan', example('crate-pusher'), '--plan', 'Monday'],
    /no step plan "Monday"\. Use one of As first wired \(wrong\), Corrected \(right\)\./,
  ],
  [['plan', example('crate-pusher'), '--plan', ''], /--plan needs the name/],
  [['plan', example('crate-pusher'), '--load', 'none'], /--load: There is no load case "none"/],
])('%j is bad input', async (args, told) => {
  const { code, out, err } = await spooltable(args);
  expect({ code, out }).toEqual({ code: 2, out: '' });
  expect(err).toMatch(told);
});
