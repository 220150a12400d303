import { join } from 'node:path';
import loadHighs from 'highs';
import { FlowSolver } from '../../src/engine/flow/solver.ts';
import { contentProgram } from '../engine/flow/quadratic.ts';
import { dice, randomCircuit } from '../engine/flow/random-circuit.ts';

type Print = (line: string) => void;

/** Processor time in ms: other work on the machine must not count. */
const clock = (): number => {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
};

/** Solves a second for a second or so; each call of `round` makes `count` solves. */
function rate(count: number, round: () => void, seconds = 1): number {
  for (let i = 0; i < 3; i++) round();
  const from = clock();
  let done = 0;
  while (clock() - from < seconds * 1000) {
    round();
    done += count;
  }
  return (done / (clock() - from)) * 1000;
}

/** Steady states of random circuits with a cylinder per six lines or so, on one core. */
async function run(print: Print): Promise<void> {
  // Bundled, the library no longer stands beside its own file.
  const highs = await loadHighs({ locateFile: (file) => join(process.cwd(), 'node_modules/highs/build', file) });
  print('Pressure layer: steady solves of random circuits, one core');
  for (const lines of [10, 20, 40]) {
    const cylinders = Math.round(lines / 6);
    const solvers = Array.from(
      { length: 100 },
      (_, i) => new FlowSolver(randomCircuit(1000 + i, { lines, cylinders })),
    );
    let iterations = 0;
    for (const solver of solvers) iterations += solver.solve().iterations;
    const cold = rate(solvers.length, () => solvers.forEach((solver) => solver.solve()));
    // Warm: one path of the circuit opens or closes, as between neighbouring rows of a table.
    let warmIterations = 0,
      warmSolves = 0;
    const last = solvers.map((solver) => solver.solve().pressures.slice());
    const roll = dice(lines);
    const flips = solvers.map((solver) => {
      const paths = solver.system.problem.branches.flatMap((b, j) =>
        b.kind === 'path' || b.kind === 'throttle' ? [j] : [],
      );
      return paths[Math.floor(roll() * paths.length)] ?? 0;
    });
    const warm = rate(2 * solvers.length, () => {
      for (let i = 0; i < solvers.length; i++) {
        const solver = solvers[i] as FlowSolver;
        const flip = flips[i] as number;
        for (let pass = 0; pass < 2; pass++) {
          solver.setOn(flip, solver.system.on[flip] === 0);
          const found = solver.solve({ warm: last[i] as Float64Array });
          (last[i] as Float64Array).set(found.pressures);
          warmIterations += found.iterations;
          warmSolves++;
        }
      }
    });
    const linear = Array.from({ length: 20 }, (_, i) => randomCircuit(1000 + i, { lines, cylinders, linear: true }));
    const programs = linear.map(contentProgram);
    const linearSolvers = linear.map((problem) => new FlowSolver(problem));
    const own = rate(linear.length, () => linearSolvers.forEach((solver) => solver.solve()), 0.5);
    const general = rate(
      linear.length,
      () => programs.forEach((text) => highs.solve(text, { output_flag: false })),
      0.5,
    );
    print(
      `  ${lines} lines: cold ${Math.round(cold)} /s (${(iterations / solvers.length).toFixed(1)} iterations), ` +
        `warm ${Math.round(warm)} /s (${(warmIterations / warmSolves).toFixed(1)}); ` +
        `straight-line losses ${Math.round(own)} /s against ${Math.round(general)} /s of a general QP solver: ${Math.round(own / general)} times`,
    );
  }
  share(print, 'pilot-free', 5000, 0);
  share(print, 'with 1 to 4 pilot-sensed valves', 5000, 1);
}

function share(print: Print, name: string, count: number, piloted: 0 | 1): void {
  let solved = 0,
    residual = 0,
    power = 0;
  const times: number[] = [];
  for (let seed = 0; seed < count; seed++) {
    const solver = new FlowSolver(
      randomCircuit(seed, { lines: 3 + (seed % 28), cylinders: 1 + (seed % 6), piloted: piloted * (1 + (seed % 4)) }),
    );
    const from = performance.now();
    const { status } = solver.solve();
    times.push(performance.now() - from);
    if (status !== 'solved') continue;
    solved++;
    const evidence = solver.certificate();
    residual = Math.max(residual, evidence.residual);
    power = Math.max(power, evidence.power);
  }
  times.sort((a, b) => a - b);
  const at = (part: number): string => (times[Math.floor(part * (count - 1))] as number).toFixed(2);
  print(
    `  ${name}: ${solved} of ${count} solved, worst residual ${residual.toExponential(1)}, worst power imbalance ${power.toExponential(1)}; ` +
      `${((100 * solved) / count).toFixed(2)} %; median ${at(0.5)} ms, 99 % within ${at(0.99)} ms`,
  );
}

await run((line) => console.log(line));
