import { lay, routeAll, routeConnection, routingSheet } from '../../src/drawing/routing.ts';
import type { Circuit, Part } from '../../src/circuit/model.ts';

/** One line laid anew on a sheet, against laying all of them, in the same run. */
function run(print: (line: string) => void): void {
  print('parts   lines   all ms   one ms   ratio');
  for (const count of [100, 300, 600]) {
    const parts = Array.from({ length: count }, (_, i): Part => ({
      id: `p${i}`,
      kind: i % 3 === 0 ? 'double-lock-check' : 'check-valve',
      at: { x: (i % 20) * 22, y: Math.floor(i / 20) * 18 },
    }));
    const connections = parts.flatMap((_, i) =>
      i % 3 === 0 || (i + 21) % 3 === 0 || i + 21 >= count
        ? []
        : [{ id: `c${i}`, from: { part: `p${i}`, port: 'A' }, to: { part: `p${i + 21}`, port: 'B' } }],
    );
    const sheet: Circuit = { name: 'Sheet', parts, connections };
    const began = performance.now();
    const routes = routeAll(sheet);
    const all = performance.now() - began;
    const [first] = connections;
    if (!first) return;
    const times = Array.from({ length: 9 }, () => {
      const field = routingSheet(sheet);
      for (const [id, points] of routes) if (id !== first.id) lay(field, id, points);
      const start = performance.now();
      routeConnection(field, first);
      return performance.now() - start;
    }).sort((a, b) => a - b);
    const one = times[4] ?? NaN;
    print(
      `${String(count).padStart(5)} ${String(connections.length).padStart(7)} ${all.toFixed(1).padStart(8)} ${one.toFixed(2).padStart(8)} ${(all / one).toFixed(0).padStart(7)}`,
    );
  }
}

run((line) => console.log(line));
