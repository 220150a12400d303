import type { Circuit } from '../circuit/model.ts';
import { partList } from '../drawing/part-list.ts';
import { field } from './csv.ts';

export const PART_LIST_HEAD = ['Item', 'Code', 'Label', 'Part', 'Data', 'Count'] as const;

/** Cells of the part list, a row for each entry, in the order of `PART_LIST_HEAD`. */
export const partListRows = (circuit: Circuit): string[][] =>
  partList(circuit).map(({ item, codes, labels, kind, data, count }) => [
    String(item),
    codes.join(', '),
    labels.join(', '),
    kind,
    data,
    String(count),
  ]);

/** The part list as RFC 4180 has it, with a head. */
export function* writePartListCsv(circuit: Circuit): Generator<string> {
  for (const row of [PART_LIST_HEAD, ...partListRows(circuit)]) yield `${row.map(field).join(',')}\r\n`;
}
