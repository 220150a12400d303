import { tabulate } from '../../src/analysis/analyse.ts';
import { foldFrom } from '../../src/analysis/fold.ts';
import { influenceFrom } from '../../src/analysis/influence.ts';
import { outcomesOf } from '../../src/analysis/outcomes.ts';
import type { Outcomes } from '../../src/analysis/outcomes.ts';
import { unlimited } from '../../src/base/budget.ts';
import { family, FAMILIES } from './circuits.ts';

/** All folds by actuators of a panel, and its influence, from open paths (20 valves) and from a listed table (13). */
const timed = <T>(work: () => T): { readonly value: T; readonly ms: number } => {
  const start = performance.now();
  const value = work();
  return { value, ms: performance.now() - start };
};

for (const valves of [20, 13]) {
  for (const name of FAMILIES) {
    const drawn = family(name, valves);
    const data = valves === 13 ? tabulate(drawn, { pumps: 'running' }, unlimited, { pressureRows: 0 }) : undefined;
    const made = timed(() => outcomesOf(drawn, { pumps: 'running' }, unlimited, data));
    if (!made.value.ok) {
      console.log(`${name}${valves}: ${made.value.problems[0]?.what ?? ''}`);
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
      `${name}${valves}: sets ${made.ms.toFixed(0)} ms, ${valves} folds ${folds.ms.toFixed(0)} ms, ${rows} rows, ${refused} refused; influence ${matrix.ms.toFixed(0)} ms${matrix.value.ok ? '' : ', refused'}`,
    );
  }
}
