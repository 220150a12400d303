import { parseArgs } from 'node:util';
import type { UnitSystem } from '../base/units.ts';
import {
  ASK_HELP,
  BLEED_HELP,
  CHECK_HELP,
  EXPLAIN_HELP,
  FOLD_HELP,
  HELP,
  INFLUENCE_HELP,
  MOVES_HELP,
  PLAN_HELP,
  POWERLOSS_HELP,
  TABLE_HELP,
  TRAPPED_HELP,
} from './help.ts';
import { attempt, loadCase, oneFile, oneOf, outFile, usage } from './option-reading.ts';
import { PLAN_SHOW_OPTIONS, planShows } from './plan-options.ts';
import type { PlanShows } from './plan-options.ts';
import { partsCommand, printCommand } from './print-options.ts';
import type { PartsFormat, PrintCommand } from './print-options.ts';

export type Pumps = 'running' | 'stopped';

export type Command =
  | PrintCommand
  | {
      readonly name: 'parts';
      readonly file: string;
      readonly format: PartsFormat;
      readonly out: string | undefined;
    }
  | (Whole & { readonly name: 'fold'; readonly by: readonly string[] })
  | (Whole & { readonly name: 'influence' })
  | (Whole & {
      readonly name: 'ask';
      readonly question: string;
      /** Rows that are listed at most. */
      readonly limit: number;
    })
  | { readonly name: 'say'; readonly text: string }
  | {
      readonly name: 'table';
      readonly file: string;
      readonly format: TableFormat;
      readonly pumps: Pumps;
      /** Name or id of a load case. */
      readonly load: string | undefined;
      /** An actuator, pump or lever of the independent part that is wanted; undefined = all of the circuit. */
      readonly part: string | undefined;
      readonly numbers: boolean;
      readonly units: UnitSystem;
      readonly out: string | undefined;
    }
  | (ExplainOptions & {
      readonly name: 'explain';
      /** File for the flow problem of the row. */
      readonly dump: string | undefined;
    })
  | (ExplainOptions & { readonly name: 'moves' })
  | {
      readonly name: 'trapped';
      readonly file: string;
      readonly format: ExplainFormat;
      readonly pumps: Pumps;
      readonly load: string | undefined;
      /** A line that is to be vented, and from which state. */
      readonly line: string | undefined;
      readonly state: readonly string[];
      readonly out: string | undefined;
    }
  | (BleedOptions & { readonly name: 'bleed' })
  | (BleedOptions & { readonly name: 'powerloss' })
  | {
      readonly name: 'check';
      readonly file: string;
      readonly format: ExplainFormat;
      readonly pumps: Pumps;
      readonly load: string | undefined;
      /** Besides those of the circuit. */
      readonly rules: readonly string[];
      readonly out: string | undefined;
    }
  | {
      readonly name: 'plan';
      readonly file: string;
      readonly format: ExplainFormat;
      readonly load: string | undefined;
      /** Name or id; all of them if not given. */
      readonly plan: string | undefined;
      /** Absent = the check of the plans. */
      readonly shows: PlanShows | undefined;
      readonly units: UnitSystem;
      readonly out: string | undefined;
    };

interface ExplainOptions {
  readonly file: string;
  readonly format: ExplainFormat;
  readonly pumps: Pumps;
  readonly load: string | undefined;
  readonly units: UnitSystem;
  readonly state: readonly string[];
  readonly out: string | undefined;
}

interface BleedOptions {
  readonly file: string;
  readonly format: BleedFormat;
  readonly load: string | undefined;
  readonly state: readonly string[];
  readonly out: string | undefined;
}

export interface Whole {
  readonly file: string;
  readonly format: ExplainFormat;
  readonly pumps: Pumps;
  readonly load: string | undefined;
  readonly out: string | undefined;
}

export const TABLE_FORMATS = ['text', 'csv', 'json', 'markdown'] as const;
export type TableFormat = (typeof TABLE_FORMATS)[number];
export const EXPLAIN_FORMATS = ['text', 'json'] as const;
export type ExplainFormat = (typeof EXPLAIN_FORMATS)[number];
/** `html`: the sheet to print. */
const BLEED_FORMATS = [...EXPLAIN_FORMATS, 'html'] as const;
export type BleedFormat = (typeof BLEED_FORMATS)[number];

const COMMON = {
  format: { type: 'string', default: 'text' },
  pumps: { type: 'string', default: 'running' },
  out: { type: 'string' },
  help: { type: 'boolean', default: false },
} as const;

const LOAD = { load: { type: 'string' } } as const;
const UNITS = { units: { type: 'string', default: 'metric' } } as const;
const UNIT_SYSTEMS = ['metric', 'us'] as const satisfies readonly UnitSystem[];

/** What the user asks for. Throws a `Failure` that says what is wrong with the command line. */
export function readArguments(args: readonly string[], version: string): Command {
  const [first, ...rest] = args;
  switch (first) {
    case undefined:
      throw usage('No command is given.');
    case '--help':
    case '-h':
    case 'help':
      return { name: 'say', text: HELP };
    case '--version':
      return { name: 'say', text: `${version}\n` };
    case 'table':
      return tableCommand(rest);
    case 'explain':
      return explainCommand('explain', EXPLAIN_HELP, rest);
    case 'moves':
      return explainCommand('moves', MOVES_HELP, rest);
    case 'trapped':
      return trappedCommand(rest);
    case 'bleed':
      return bleedCommand('bleed', BLEED_HELP, rest);
    case 'powerloss':
      return bleedCommand('powerloss', POWERLOSS_HELP, rest);
    case 'check':
      return checkCommand(rest);
    case 'plan':
      return planCommand(rest);
    case 'fold':
      return foldCommand(rest);
    case 'influence':
      return influenceCommand(rest);
    case 'ask':
      return askCommand(rest);
    case 'print':
      return printCommand(rest);
    case 'parts':
      return partsCommand(rest);
    default:
      throw usage(first.startsWith('-') ? `Unknown option ${first}.` : `Unknown command "${first}".`);
  }
}

function tableCommand(args: string[]): Command {
  const { values, positionals } = attempt('table', () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: {
        ...COMMON,
        ...LOAD,
        ...UNITS,
        part: { type: 'string' },
        numbers: { type: 'boolean', default: false },
      },
    }),
  );
  if (values.help) return { name: 'say', text: TABLE_HELP };
  if (values.part === '') throw usage('--part needs the name of an actuator, a pump or a lever.', 'table');
  return {
    name: 'table',
    file: oneFile('table', positionals),
    format: oneOf('table', '--format', values.format, TABLE_FORMATS),
    pumps: oneOf('table', '--pumps', values.pumps, ['running', 'stopped']),
    load: loadCase('table', values.load),
    part: values.part,
    numbers: values.numbers,
    units: oneOf('table', '--units', values.units, UNIT_SYSTEMS),
    out: outFile('table', values.out),
  };
}

function explainCommand(name: 'explain' | 'moves', text: string, args: string[]): Command {
  const { values, positionals } = attempt(name, () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: {
        ...COMMON,
        ...LOAD,
        ...UNITS,
        ...(name === 'explain' && { dump: { type: 'string' } as const }),
        state: { type: 'string', multiple: true, default: [] },
      },
    }),
  );
  if (values.help) return { name: 'say', text };
  const dump = typeof values.dump === 'string' ? values.dump : undefined;
  if (dump === '') throw usage('--dump needs the name of a file.', name);
  const options = {
    file: oneFile(name, positionals),
    format: oneOf(name, '--format', values.format, EXPLAIN_FORMATS),
    pumps: oneOf(name, '--pumps', values.pumps, ['running', 'stopped']),
    load: loadCase(name, values.load),
    units: oneOf(name, '--units', values.units, UNIT_SYSTEMS),
    state: values.state,
    out: outFile(name, values.out),
  };
  return name === 'explain' ? { name, ...options, dump } : { name, ...options };
}

function trappedCommand(args: string[]): Command {
  const { values, positionals } = attempt('trapped', () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: {
        ...COMMON,
        ...LOAD,
        line: { type: 'string' },
        state: { type: 'string', multiple: true, default: [] },
      },
    }),
  );
  if (values.help) return { name: 'say', text: TRAPPED_HELP };
  if (values.line === '') throw usage('--line needs the name of a line.', 'trapped');
  if (values.line === undefined && values.state.length > 0) throw usage('--state goes with --line.', 'trapped');
  return {
    name: 'trapped',
    file: oneFile('trapped', positionals),
    format: oneOf('trapped', '--format', values.format, EXPLAIN_FORMATS),
    pumps: oneOf('trapped', '--pumps', values.pumps, ['running', 'stopped']),
    load: loadCase('trapped', values.load),
    line: values.line,
    state: values.state,
    out: outFile('trapped', values.out),
  };
}

function bleedCommand(name: 'bleed' | 'powerloss', text: string, args: string[]): Command {
  const { format, out, help } = COMMON;
  const { values, positionals } = attempt(name, () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: { format, out, help, ...LOAD, state: { type: 'string', multiple: true, default: [] } },
    }),
  );
  if (values.help) return { name: 'say', text };
  return {
    name,
    file: oneFile(name, positionals),
    format: oneOf(name, '--format', values.format, name === 'bleed' ? BLEED_FORMATS : EXPLAIN_FORMATS),
    load: loadCase(name, values.load),
    state: values.state,
    out: outFile(name, values.out),
  };
}

function checkCommand(args: string[]): Command {
  const { values, positionals } = attempt('check', () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: { ...COMMON, ...LOAD, rule: { type: 'string', multiple: true, default: [] } },
    }),
  );
  if (values.help) return { name: 'say', text: CHECK_HELP };
  return {
    name: 'check',
    file: oneFile('check', positionals),
    format: oneOf('check', '--format', values.format, EXPLAIN_FORMATS),
    pumps: oneOf('check', '--pumps', values.pumps, ['running', 'stopped']),
    load: loadCase('check', values.load),
    rules: values.rule,
    out: outFile('check', values.out),
  };
}

function planCommand(args: string[]): Command {
  const { format, out, help } = COMMON;
  const { values, positionals } = attempt('plan', () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: { format, out, help, ...LOAD, ...UNITS, ...PLAN_SHOW_OPTIONS, plan: { type: 'string' } },
    }),
  );
  if (values.help) return { name: 'say', text: PLAN_HELP };
  if (values.plan === '') throw usage('--plan needs the name of a step plan.', 'plan');
  const shows = planShows(values);
  if (typeof shows === 'string') throw usage(shows, 'plan');
  return {
    name: 'plan',
    file: oneFile('plan', positionals),
    format: oneOf('plan', '--format', values.format, EXPLAIN_FORMATS),
    load: loadCase('plan', values.load),
    plan: values.plan,
    shows,
    units: oneOf('plan', '--units', values.units, UNIT_SYSTEMS),
    out: outFile('plan', values.out),
  };
}

function foldCommand(args: string[]): Command {
  const { values, positionals } = attempt('fold', () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: { ...COMMON, ...LOAD, by: { type: 'string', multiple: true, default: [] } },
    }),
  );
  if (values.help) return { name: 'say', text: FOLD_HELP };
  return { name: 'fold', ...wholeOf('fold', values, positionals), by: values.by };
}

function influenceCommand(args: string[]): Command {
  const { values, positionals } = attempt('influence', () =>
    parseArgs({ args, strict: true, allowPositionals: true, options: { ...COMMON, ...LOAD } }),
  );
  if (values.help) return { name: 'say', text: INFLUENCE_HELP };
  return { name: 'influence', ...wholeOf('influence', values, positionals) };
}

function askCommand(args: string[]): Command {
  const { values, positionals } = attempt('ask', () =>
    parseArgs({
      args,
      strict: true,
      allowPositionals: true,
      options: { ...COMMON, ...LOAD, limit: { type: 'string', default: '20' } },
    }),
  );
  if (values.help) return { name: 'say', text: ASK_HELP };
  const [file, question = '', more] = positionals;
  if (more !== undefined) throw usage(`The question ends before "${more}"; put it in quotes.`, 'ask');
  if (file !== undefined && question.trim() === '') throw usage('No question is given.', 'ask');
  if (!/^\d+$/.test(values.limit)) throw usage(`--limit takes a number, not "${values.limit}".`, 'ask');
  return {
    name: 'ask',
    ...wholeOf('ask', values, file === undefined ? [] : [file]),
    question,
    limit: Number(values.limit),
  };
}

function wholeOf(
  command: string,
  values: { readonly format: string; readonly pumps: string; readonly load?: string; readonly out?: string },
  files: readonly string[],
): Whole {
  return {
    file: oneFile(command, files),
    format: oneOf(command, '--format', values.format, EXPLAIN_FORMATS),
    pumps: oneOf(command, '--pumps', values.pumps, ['running', 'stopped']),
    load: loadCase(command, values.load),
    out: outFile(command, values.out),
  };
}
