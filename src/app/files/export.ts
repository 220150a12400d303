import { version } from '../../../package.json';
import { writeCsv } from '../../report/csv.ts';
import { writeJson } from '../../report/json.ts';
import { writeMarkdown } from '../../report/markdown.ts';
import { makeReport } from '../../report/rows.ts';
import type { Report } from '../../report/rows.ts';
import { notices } from '../state/notices.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { download, fileStem } from './save.ts';

const WRITERS: Readonly<
  Record<'csv' | 'json' | 'md', { readonly type: string; readonly write: (report: Report) => Generator<string> }>
> = {
  csv: { type: 'text/csv', write: writeCsv },
  json: { type: 'application/json', write: writeJson },
  md: { type: 'text/markdown', write: writeMarkdown },
};
const SLICE_MS = 12;
/** Strings join into one piece of the file at this length, so that a million rows are not a million pieces. */
const PIECE = 1 << 20;

export async function exportTable(form: keyof typeof WRITERS): Promise<void> {
  const { answer } = session;
  if (!answer) return;
  const { table, findings, circuit, conditions } = answer;
  const { type, write } = WRITERS[form];
  const pieces: string[] = [];
  let piece = '';
  let until = performance.now() + SLICE_MS;
  let waited = false;
  for (const text of write(makeReport({ version, circuit, conditions, table, findings }))) {
    piece += text;
    if (piece.length > PIECE) {
      pieces.push(piece);
      piece = '';
    }
    if (performance.now() < until) continue;
    if (!waited) notices.say({ level: 'note', title: `Writing ${table.count.toLocaleString('en')} rows…` });
    waited = true;
    await new Promise((resolve) => setTimeout(resolve));
    until = performance.now() + SLICE_MS;
  }
  download(`${fileStem(circuit.name)}.${form}`, new Blob([...pieces, piece], { type }), type);
}
