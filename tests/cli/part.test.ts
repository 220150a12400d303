import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { writeCircuit } from '../../src/circuit/file.ts';
import { circuit } from '../notation.ts';
import { passingFolder, spooltable } from './spooltable.ts';

let folder: ReturnType<typeof passingFolder>;
let file: string;
beforeEach(() => {
  folder = passingFolder();
  file = join(folder.path, 'two.spool.json');
  const half = (n: number): string =>
    `P${n} fixed-pump, R${n} relief-valve, T${n} tank, V${n} directional-valve:valve-4/3-bypass, C${n} cylinder`;
  const lines = (n: number): string =>
    `P${n}.P R${n}.P V${n}.P | V${n}.A C${n}.A | V${n}.B C${n}.B | V${n}.T R${n}.T T${n}.T P${n}.S`;
  // Two power units that share nothing: by construction V1 has no say over C2.
  writeFileSync(file, writeCircuit(circuit(`${half(1)}, ${half(2)} | ${lines(1)} | ${lines(2)}`)));
});
afterEach(() => folder.remove());

const rows = (csv: string): string[][] =>
  csv
    .trim()
    .split('\r\n')
    .map((line) => line.split(','));

test('influence says which names lead to the table of a part, and the table has the rows of that part', async () => {
  const found = await spooltable(['influence', file]);
  expect(found.out).toContain('The table of one of them: table --part, with the name of any actuator, pump or lever');
  const whole = rows((await spooltable(['table', file, '--format', 'csv'])).out);
  expect(whole).toHaveLength(1 + 9);
  for (const name of ['C2', 'P2', 'V2']) {
    const { code, out } = await spooltable(['table', file, '--part', name, '--format', 'csv']);
    expect(code).toBe(0);
    const part = rows(out);
    expect(part).toHaveLength(1 + 3);
    const column = (table: string[][], title: string): number => (table[0] ?? []).indexOf(title);
    // What C2 and P2 do in each position of V2 is what they do in every row of the whole table with V2 there.
    for (const row of part.slice(1)) {
      expect(row[column(part, 'V1')]).toBe('0');
      const alike = whole.slice(1).filter((other) => other[column(whole, 'V2')] === row[column(part, 'V2')]);
      expect(alike).toHaveLength(3);
      for (const other of alike)
        for (const title of ['C2', 'P2']) expect(other[column(whole, title)]).toBe(row[column(part, title)]);
    }
  }
});

test('the head says that levers are held, and a name of no part is refused with the names there are', async () => {
  const { out } = await spooltable(['table', file, '--part', 'C1']);
  expect(out).toMatch(/pumps running, 1 lever held/);
  const { code, err } = await spooltable(['table', file, '--part', 'C9']);
  expect(code).toBe(2);
  expect(err).toMatch(
    /--part: No independent part has an actuator, pump or lever "C9"\. Parts by one name each: C1, C2\./,
  );
});
