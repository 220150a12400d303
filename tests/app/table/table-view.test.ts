import { readFileSync } from 'node:fs';
import { afterEach, expect, test, vi } from 'vitest';
import { tableView } from '../../../src/app/table/table-view.svelte.ts';
import { columnGroups } from '../../../src/app/table/columns.ts';
import { readCircuit } from '../../../src/circuit/file.ts';
import { Asked } from '../../table-of.ts';

// What is remembered of the window; there is none here.
vi.hoisted(() => vi.stubGlobal('window', { innerWidth: 1440 }));

const read = readCircuit(readFileSync(new URL('../../../examples/log-deck.spool.json', import.meta.url), 'utf8'));
if (!read.ok) throw new Error('the example cannot be read');
const { table } = new Asked(read.value);
const column = columnGroups(table)
  .flatMap(({ columns }) => columns)
  .find(({ of }) => of === 'actuator');
if (!column) throw new Error('no column');
const keep = table.actuatorCounts(0).map((_, i) => i);

afterEach(() => vi.restoreAllMocks());

/** Every look at the clock is 600 ms after the last. */
function slowClock(): void {
  let now = 0;
  vi.spyOn(performance, 'now').mockImplementation(() => (now += 600));
}

test('arranging that takes long says so, and stopping it leaves sort and filters as they were', async () => {
  tableView.sort = { column, falling: false };
  await tableView.arrange(table);
  const { sort, filters } = tableView;

  slowClock();
  tableView.setFilter(column, keep);
  const work = tableView.arrange(table);
  expect(tableView.busy).toBe(true);
  expect(tableView.slow).toBe(true);
  expect(tableView.share).toBeGreaterThanOrEqual(0);
  expect(tableView.stop(table, undefined)).toBe(true);
  await work;
  expect(tableView.busy).toBe(false);
  expect(tableView.sort).toBe(sort);
  expect(tableView.filters).toBe(filters);
});

test('a question whose rows were being gathered has to go when that is stopped', async () => {
  tableView.setFilter(column, keep);
  await tableView.arrange(table);
  slowClock();
  const among = new Uint32Array((table.count + 31) >>> 5).fill(5);
  const work = tableView.arrange(table, among);
  expect(tableView.busy).toBe(true);
  expect(tableView.stop(table, among)).toBe(false);
  await work;
});

test('what is arranged already is not arranged again', async () => {
  await tableView.arrange(table);
  slowClock();
  const work = tableView.arrange(table);
  expect(tableView.busy).toBe(false);
  await work;
  tableView.setFilter(column, keep.slice(1));
  const other = tableView.arrange(table);
  expect(tableView.busy).toBe(true);
  await other;
});
