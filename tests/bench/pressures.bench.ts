import { networkOf, numbersOf } from '../../src/analysis/analyse.ts';
import { unlimited } from '../../src/base/budget.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { tabulate } from '../../src/engine/table/tabulate.ts';
import { circuit } from '../notation.ts';
import { family } from './circuits.ts';

/** Processor time in ms: other work on the machine must not count. */
function clock(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

const SUPPLY = 'P1 fixed-pump{flow=40 L/min}, R1 relief-valve{setting=180 bar}, T1 tank';

/** Valves in parallel, each with a cylinder whose load differs from all others'. */
function loaded(valves: number, form = 'valve-4/3-shut'): Circuit {
  const numbers = Array.from({ length: valves }, (_, i) => i + 1);
  const all = (port: string): string => numbers.map((i) => `V${i}.${port}`).join(' ');
  const parts = numbers.map(
    (i) =>
      `V${i} directional-valve:${form}, C${i} cylinder{bore=50 mm;rod=28 mm;load=${4 + 1.5 * i} kN;loadSense=${i % 2 === 0 ? 'pushes in' : 'resisting'}}`,
  );
  const chambers = numbers.map((i) => `V${i}.A C${i}.A | V${i}.B C${i}.B`);
  return circuit(
    `${SUPPLY}, ${parts.join(', ')} | P1.P R1.P ${all('P')} | ${all('T')} R1.T T1.T P1.S | ${chambers.join(' | ')}`,
  );
}

/** Six inputs, two of them pilot stages of two-stage valves: 729 rows, in which the main spools are settled. */
function staged(): Circuit {
  const numbers = [1, 2, 3, 4, 5, 6];
  const all = (port: string): string => numbers.map((i) => `V${i}.${port}`).join(' ');
  const parts = numbers.map(
    (i) =>
      `V${i} ${i < 3 ? 'two-stage-valve:two-stage-4/3-shut-coils' : 'directional-valve:valve-4/3-shut'}, C${i} cylinder{bore=50 mm;rod=28 mm;load=${4 + i} kN;loadSense=resisting}`,
  );
  const chambers = numbers.map((i) => `V${i}.A C${i}.A | V${i}.B C${i}.B`);
  return circuit(
    `${SUPPLY}, ${parts.join(', ')} | P1.P R1.P ${all('P')} | ${all('T')} R1.T T1.T P1.S | ${chambers.join(' | ')}`,
  );
}

function table(name: string, drawn: Circuit): void {
  const net = networkOf(drawn);
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
  const times = Array.from({ length: count > 10_000 ? 1 : 3 }, () => {
    const began = clock();
    tabulate(net, conditions, unlimited, { pressureRows: 1_000_000 });
    return clock() - began;
  });
  const best = Math.min(...times);
  console.log(
    `  ${name.padEnd(34)} ${String(count).padStart(6)} rows: first ${String(Math.round(times[0] ?? 0)).padStart(6)} ms, ` +
      `quickest ${String(Math.round(best)).padStart(6)} ms, ${((1000 * best) / count).toFixed(0).padStart(4)} µs a row`,
  );
}

console.log('Tables whose every row the pressures solve, one core, processor time');
table('8 valves in parallel, loads', loaded(8));
table('8 bypass centres in series', family('SERIES', 8));
table('8 valves in parallel, no loads', family('BANK', 8));
table('8 of six forms', family('MIX', 8));
table('4 and 2 two-stage valves', staged());
table('10 valves in parallel, loads', loaded(10));
const began = clock();
numbersOf(
  loaded(8),
  { pumps: 'running' },
  Array.from({ length: 1000 }, (_, i) => i),
);
console.log(`  numbers of 1,000 rows: ${Math.round(clock() - began)} ms`);
