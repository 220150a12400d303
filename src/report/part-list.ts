import type { Circuit } from '../circuit/model.ts';
import { hasSheets } from '../circuit/sheets.ts';
import { partList } from '../drawing/part-list.ts';
import { field } from './csv.ts';

const HEAD = ['Item', 'Code', 'Label', 'Part', 'Data', 'Count'] as const;

/** Of one sheet nobody needs to be told the number. */
export const partListHead = (circuit: Circuit): string[] =>
  hasSheets(circuit) ? [...HEAD.slice(0, -1), 'Sheet', 'Count'] : [...HEAD];

/** Cells of the part list, a row for each entry, in the order of `partListHead`. */
export const partListRows = (circuit: Circuit): string[][] =>
  partList(circuit).map(({ item, codes, labels, kind, data, sheets, count }) => [
    String(item),
    codes.join(', '),
    labels.join(', '),
    kind,
    data,
    ...(hasSheets(circuit) ? [sheets.join(', ')] : []),
    String(count),
  ]);

/** The part list as RFC 4180 has it, with a head. */
export function* writePartListCsv(circuit: Circuit): Generator<string> {
  for (const row of [partListHead(circuit), ...partListRows(circuit)]) yield `${row.map(field).join(',')}\r\n`;
}
