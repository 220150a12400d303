import { parseArgs } from 'node:util';
import type { Paper } from '../circuit/paper.ts';
import { PAPERS } from '../circuit/paper.ts';
import { PARTS_HELP, PRINT_HELP } from './print-help.ts';
import { attempt, loadCase, oneFile, oneOf, outFile, usage } from './option-reading.ts';

/** What `print` can lay out, in this order. */
export const PRINTED = ['drawing', 'chart', 'notes', 'findings', 'parts'] as const;
export type Printed = (typeof PRINTED)[number];
export const PARTS_FORMATS = ['text', 'csv'] as const;
export type PartsFormat = (typeof PARTS_FORMATS)[number];

export interface PrintCommand {
  readonly name: 'print';
  readonly file: string;
  readonly pumps: 'running' | 'stopped';
  readonly load: string | undefined;
  /** Empty: drawn without a state. */
  readonly state: readonly string[];
  /** Instead of that of the circuit. */
  readonly paper: Paper | undefined;
  readonly only: readonly Printed[];
  readonly out: string | undefined;
}

type Said = { readonly name: 'say'; readonly text: string };

export function printCommand(args: string[]): PrintCommand | Said {
  const { values, positionals } = attempt('print', () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: {
        pumps: { type: 'string', default: 'running' },
        load: { type: 'string' },
        state: { type: 'string', multiple: true, default: [] },
        paper: { type: 'string' },
        only: { type: 'string', multiple: true, default: [] },
        out: { type: 'string' },
        help: { type: 'boolean', default: false },
      },
    }),
  );
  if (values.help) return { name: 'say', text: PRINT_HELP };
  const only = values.only.flatMap((text) => text.split(',')).map((word) => word.trim());
  if (values.only.length > 0 && only.every((word) => word === ''))
    throw usage('--only needs what is printed.', 'print');
  return {
    name: 'print',
    file: oneFile('print', positionals),
    pumps: oneOf('print', '--pumps', values.pumps, ['running', 'stopped']),
    load: loadCase('print', values.load),
    state: values.state,
    paper: values.paper === undefined ? undefined : oneOf('print', '--paper', values.paper, PAPERS),
    only: only.length > 0 ? only.map((word) => oneOf('print', '--only', word, PRINTED)) : PRINTED,
    out: outFile('print', values.out),
  };
}

export function partsCommand(
  args: string[],
):
  | { readonly name: 'parts'; readonly file: string; readonly format: PartsFormat; readonly out: string | undefined }
  | Said {
  const { values, positionals } = attempt('parts', () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: {
        format: { type: 'string', default: 'text' },
        out: { type: 'string' },
        help: { type: 'boolean', default: false },
      },
    }),
  );
  if (values.help) return { name: 'say', text: PARTS_HELP };
  return {
    name: 'parts',
    file: oneFile('parts', positionals),
    format: oneOf('parts', '--format', values.format, PARTS_FORMATS),
    out: outFile('parts', values.out),
  };
}
