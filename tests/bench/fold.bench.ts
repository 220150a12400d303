import { tabulate } from '../../src/analysis/analyse.ts';
import { foldFrom } from '../../src/analysis/fold.ts';
import { influenceFrom } from '../../src/analysis/influence.ts';
import { outcomesOf } from '../../src/analysis/outcomes.ts';
import type { Outcomes } from '../../src/analysis/outcomes.ts';
import { unlimited } from '../../src/base/budget.ts';
import { family, FAMILIES } from './circuits.ts';
import { randomPanel } from './random-panel.ts';

/** All folds by actuators of a panel, and its influence, from open paths (20 inputs) and from a listed table (13). */
const timed = <T>(work: () => T): { readonly value: T; readonly ms: number } => {
  const start = performance.now();
  const value = work();
  return { value, ms: performance.now() - start };
};

const cases = [
  ...FAMILIES.map((name) => ({ name: `${name}20`, drawn: family(name, 20), listed: false })),
  ...[1, 2, 3, 5, 8].map((seed) => ({ name: `RANDOM20, seed ${seed}`, drawn: randomPanel(20, seed), listed: false })),
  ...FAMILIES.map((name) => ({ name: `${name}13`, drawn: family(name, 13), listed: true })),
];
for (const { name, drawn, listed } of cases) {
  const data = listed ? tabulate(drawn, { pumps: 'running' }, unlimited, { pressureRows: 0 }) : undefined;
  const made = timed(() => outcomesOf(drawn, { pumps: 'running' }, unlimited, data));
  if (!made.value.ok) {
    console.log(`${name}: ${made.value.problems[0]?.what ?? ''}`);
    continue;
  }
  const outcomes: Outcomes = made.value.value;
  let rows = 0;
  let refused = 0;
  const folds = timed(() => {
    outcomes.net.actuators.forEach((_, index) => {
      const folded = foldFrom(outcomes, { of: 'actuator', index }, unlimited);
      if (folded.ok) rows += folded.value.rows.length + 1;
      else refused += 1;
    });
  });
  const matrix = timed(() => influenceFrom(outcomes, unlimited));
  console.log(
    `${name}: sets ${made.ms.toFixed(0)} ms, ${outcomes.net.actuators.length} folds ${folds.ms.toFixed(0)} ms, ${rows} rows, ${refused} refused; influence ${matrix.ms.toFixed(0)} ms${matrix.value.ok ? '' : ', refused'}`,
  );
}
