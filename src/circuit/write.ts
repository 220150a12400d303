import type { Point } from '../base/points.ts';
import {
  sayPort,
  type Circuit,
  type CircuitSheet,
  type Connection,
  type Extra,
  type Label,
  type LoadCase,
  type Part,
  type PartGroup,
  type ReadyMadeValve,
  type RuleText,
  type ValveData,
} from './model.ts';
import type { PlanStep, StepEnd, StepPlan } from './plan.ts';
import { FORMAT, VERSION } from './schema.ts';

type Fields = Record<string, unknown>;
const WIDTH = 160;
/** Lists that have a line for each member. */
const LISTS: ReadonlySet<string> = new Set([
  'sheets',
  'parts',
  'connections',
  'labels',
  'groups',
  'readyMadeValves',
  'rules',
  'loadCases',
  'plans',
]);

/**
 * The circuit as text of a `*.spool.json` file. Fields come in a fixed order, parts and connections in the
 * order of the document and one to a line where they fit, so that a small change makes a small difference.
 */
export function writeCircuit(circuit: Circuit): string {
  const fields = withExtra(
    {
      format: FORMAT,
      version: VERSION,
      name: circuit.name,
      title: circuit.title,
      paper: circuit.paper,
      notes: circuit.notes,
      sheets: circuit.sheets?.map(sheetFields),
      parts: circuit.parts.map(partFields),
      connections: circuit.connections.map(connectionFields),
      labels: circuit.labels?.map(labelFields),
      groups: circuit.groups?.map(groupFields),
      readyMadeValves: circuit.readyMadeValves?.map(readyMadeFields),
      rules: circuit.rules?.map(ruleFields),
      loadCases: circuit.loadCases?.map(loadCaseFields),
      plans: circuit.plans?.map(planFields),
    },
    circuit.extra,
  );
  const lines = Object.entries(fields).map(([key, value]) => {
    return `  ${JSON.stringify(key)}: ${LISTS.has(key) ? broken(value as unknown[], 2) : pretty(value, 2, key.length + 4)}`;
  });
  return `{\n${lines.join(',\n')}\n}\n`;
}

const pair = (p: Point): [number, number] => [p.x, p.y];

const sheetFields = ({ id, name, extra }: CircuitSheet): Fields => withExtra({ id, name }, extra);

const partFields = (part: Part): Fields =>
  withExtra(
    {
      id: part.id,
      kind: part.kind,
      label: part.label,
      code: part.code,
      sheet: part.sheet,
      at: part.at && pair(part.at),
      turn: part.turn,
      flip: part.flip,
      settings: part.settings,
      valve: part.valve && valveFields(part.valve),
    },
    part.extra,
  );

const valveFields = (valve: ValveData): Fields =>
  withExtra(
    {
      ports: valve.ports.map((port) => withExtra({ id: port.id, side: port.side }, port.extra)),
      positions: valve.positions.map((position) =>
        withExtra({ name: position.name, paths: position.paths }, position.extra),
      ),
      crossovers: valve.crossovers,
      rest: valve.rest,
      left: valve.left,
      right: valve.right,
      coils: valve.coils?.map((coil) => withExtra({ name: coil.name, position: coil.position }, coil.extra)),
    },
    valve.extra,
  );

const connectionFields = (connection: Connection): Fields =>
  withExtra(
    {
      id: connection.id,
      from: sayPort(connection.from),
      to: sayPort(connection.to),
      name: connection.name,
      use: connection.use,
      size: connection.size,
      bends: connection.bends?.map(pair),
    },
    connection.extra,
  );

const labelFields = (label: Label): Fields =>
  withExtra({ id: label.id, sheet: label.sheet, at: pair(label.at), text: label.text }, label.extra);

const groupFields = ({ id, name, parts, extra }: PartGroup): Fields => withExtra({ id, name, parts }, extra);

const readyMadeFields = ({ id, title, kind, valve, extra }: ReadyMadeValve): Fields =>
  withExtra({ id, title, kind, valve: valveFields(valve) }, extra);

const ruleFields = (rule: RuleText): Fields => withExtra({ id: rule.id, text: rule.text }, rule.extra);

const loadCaseFields = ({ id, name, loads, extra }: LoadCase): Fields => withExtra({ id, name, loads }, extra);

const planFields = ({ id, name, start, standing, loadCase, steps, extra }: StepPlan): Fields =>
  withExtra({ id, name, start, standing, loadCase, steps: steps.map(stepFields) }, extra);

const stepFields = ({ id, name, coils, levers, stopped, expect, ends, within, extra }: PlanStep): Fields =>
  withExtra({ id, name, coils, levers, stopped, expect, ends: endFields(ends), within }, extra);

const endFields = ({ extra, ...known }: StepEnd): Fields => withExtra(known, extra);

/** Known fields first and never overruled by an unknown one of the same name. */
function withExtra(fields: Fields, extra: Extra | undefined): Fields {
  const out: Fields = {};
  for (const [key, value] of Object.entries(fields)) if (value !== undefined) out[key] = value;
  for (const [key, value] of Object.entries(extra ?? {}))
    if (!Object.hasOwn(fields, key) && value !== undefined) out[key] = value;
  return out;
}

const isObject = (value: unknown): value is object => typeof value === 'object' && value !== null;
const entriesOf = (value: object): [string, unknown][] => Object.entries(value).filter(([, v]) => v !== undefined);

function inline(value: unknown): string {
  if (!isObject(value)) return JSON.stringify(value) ?? 'null';
  if (Array.isArray(value)) return `[${value.map(inline).join(', ')}]`;
  const fields = entriesOf(value).map(([key, v]) => `${JSON.stringify(key)}: ${inline(v)}`);
  return fields.length === 0 ? '{}' : `{ ${fields.join(', ')} }`;
}

/** `taken`: characters before the value on its line besides the indent; a comma may follow. */
function pretty(value: unknown, indent: number, taken: number): string {
  const flat = inline(value);
  if (!isObject(value) || indent + taken + flat.length + 1 <= WIDTH) return flat;
  return broken(value, indent);
}

function broken(value: object, indent: number): string {
  const pad = ' '.repeat(indent + 2);
  const isList = Array.isArray(value);
  const lines = isList
    ? value.map((v) => pad + pretty(v, indent + 2, 0))
    : entriesOf(value).map(
        ([key, v]) => `${pad}${JSON.stringify(key)}: ${pretty(v, indent + 2, JSON.stringify(key).length + 2)}`,
      );
  if (lines.length === 0) return isList ? '[]' : '{}';
  const [before, after] = isList ? '[]' : '{}';
  return `${before}\n${lines.join(',\n')}\n${' '.repeat(indent)}${after}`;
}
