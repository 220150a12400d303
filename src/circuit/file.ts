import type { Point } from '../base/points.ts';
import { bad, good, type Problem, type Result } from '../base/result.ts';
import { solid } from './fields.ts';
import { parseJson, sayPath } from './json.ts';
import { LIMITS } from './limits.ts';
import { migrate, STEPS, type RawFile, type Step } from './migrate.ts';
import {
  labelOf,
  type Circuit,
  type CircuitSheet,
  type Connection,
  type Extra,
  type Label,
  type LoadCase,
  type Part,
  type PartGroup,
  type PortRef,
  type ReadyMadeValve,
  type RuleText,
  type ValveData,
} from './model.ts';
import { checkStepIds, toPlan } from './plan-file.ts';
import { quote, sayIssue, shorten } from './problems.ts';
import {
  fileSchema,
  FORMAT,
  KNOWN,
  type FileCircuit,
  type FileConnection,
  type FileGroup,
  type FileLabel,
  type FileLoadCase,
  type FilePart,
  type FileReadyMadeValve,
  type FileRule,
  type FileSheet,
  type FileValve,
} from './schema.ts';

export { writeCircuit } from './write.ts';

/** Lists of things with ids. */
const LISTS = [
  'sheets',
  'parts',
  'connections',
  'labels',
  'groups',
  'readyMadeValves',
  'rules',
  'loadCases',
  'plans',
] as const satisfies readonly (keyof typeof LIMITS)[];

/**
 * Read a `*.spool.json` text. A file with a problem is refused whole; unknown fields and doubled
 * connections are kept and come back as warnings. Part kinds and their ports are not looked at here.
 */
export function readCircuit(text: string, steps: ReadonlyMap<number, Step> = STEPS): Result<Circuit> {
  const parsed = parseJson(text);
  if (!parsed.ok) return parsed;
  const raw = parsed.value;
  if (typeof raw !== 'object' || raw === null || Array.isArray(raw)) {
    return bad({
      where: 'file',
      what: 'The file holds no circuit: it is not an object.',
      remedy: 'Open a file that this program has saved.',
    });
  }
  const refused = checkFormat(raw as RawFile);
  if (refused) return bad(refused);
  const raised = migrate(raw as RawFile, steps);
  if (!raised.ok) return raised;
  const tooMany = checkSize(raised.value);
  if (tooMany) return bad(tooMany);
  const shaped = fileSchema.safeParse(raised.value);
  if (!shaped.success) return bad(...shorten(shaped.error.issues.map((issue) => sayIssue(issue, raised.value))));
  const warnings: Problem[] = [];
  const circuit = toCircuit(shaped.data, warnings);
  const problems = [...checkIds(circuit), ...checkSheets(circuit), ...checkConnections(circuit, warnings)];
  return problems.length > 0 ? bad(...shorten(problems)) : good(circuit, shorten(warnings));
}

function checkFormat(raw: RawFile): Problem | undefined {
  if (raw['format'] === FORMAT) return undefined;
  const remedy = `A circuit file starts with "format": "${FORMAT}".`;
  if (raw['format'] === undefined)
    return { where: 'format', what: 'The format is missing: this may be some other JSON file.', remedy };
  return { where: 'format', what: `The format is ${quote(raw['format'])}.`, remedy };
}

function checkSize(raw: RawFile): Problem | undefined {
  for (const field of LISTS) {
    const list = raw[field];
    if (Array.isArray(list) && list.length > LIMITS[field]) {
      return {
        where: field,
        what: `The circuit has ${list.length} ${field}; at most ${LIMITS[field]} can be read.`,
        remedy: 'Split it into several circuits.',
      };
    }
  }
  return undefined;
}

/** `-0` becomes 0, so that equal places are equal. */
const toPoint = ([x, y]: readonly [number, number]): Point => ({ x: x + 0, y: y + 0 });
function toPort(text: string): PortRef {
  const dot = text.indexOf('.');
  return { part: text.slice(0, dot), port: text.slice(dot + 1) };
}

function toCircuit(file: FileCircuit, warnings: Problem[]): Circuit {
  const extraOf = (
    object: Record<string, unknown>,
    known: ReadonlySet<string>,
    path: readonly PropertyKey[],
  ): Extra | undefined => {
    let extra: Record<string, unknown> | undefined;
    for (const key of Object.keys(object)) {
      if (known.has(key)) continue;
      (extra ??= {})[key] = object[key];
      warnings.push({
        where: sayPath([...path, key]),
        what: 'This field is unknown.',
        remedy: 'It is kept and saved again, but has no effect.',
      });
    }
    return extra;
  };
  const toValve = (valve: FileValve, path: readonly PropertyKey[]): ValveData =>
    solid<Required<ValveData>>({
      ports: valve.ports.map((port, i) =>
        solid({ id: port.id, side: port.side, extra: extraOf(port, KNOWN.valvePort, [...path, 'ports', i]) }),
      ),
      positions: valve.positions.map((position, i) =>
        solid({
          name: position.name,
          paths: position.paths,
          extra: extraOf(position, KNOWN.valvePosition, [...path, 'positions', i]),
        }),
      ),
      crossovers: valve.crossovers,
      rest: valve.rest,
      left: valve.left,
      right: valve.right,
      coils: valve.coils?.map((coil, i) =>
        solid({ name: coil.name, position: coil.position, extra: extraOf(coil, KNOWN.coil, [...path, 'coils', i]) }),
      ),
      extra: extraOf(valve, KNOWN.valve, path),
    });
  const toSheet = (sheet: FileSheet, i: number): CircuitSheet =>
    solid<Required<CircuitSheet>>({
      id: sheet.id,
      name: sheet.name,
      extra: extraOf(sheet, KNOWN.sheet, ['sheets', i]),
    });
  const toPart = (part: FilePart, i: number): Part =>
    solid<Required<Part>>({
      id: part.id,
      kind: part.kind,
      label: part.label,
      code: part.code,
      sheet: part.sheet,
      at: part.at && toPoint(part.at),
      turn: part.turn,
      flip: part.flip,
      settings: part.settings,
      valve: part.valve && toValve(part.valve, ['parts', i, 'valve']),
      extra: extraOf(part, KNOWN.part, ['parts', i]),
    });
  const toConnection = (connection: FileConnection, i: number): Connection =>
    solid<Required<Connection>>({
      id: connection.id,
      from: toPort(connection.from),
      to: toPort(connection.to),
      name: connection.name,
      use: connection.use,
      size: connection.size,
      bends: connection.bends?.map(toPoint),
      extra: extraOf(connection, KNOWN.connection, ['connections', i]),
    });
  const toLabel = (label: FileLabel, i: number): Label =>
    solid<Required<Label>>({
      id: label.id,
      sheet: label.sheet,
      at: toPoint(label.at),
      text: label.text,
      extra: extraOf(label, KNOWN.label, ['labels', i]),
    });
  const toGroup = (group: FileGroup, i: number): PartGroup =>
    solid<Required<PartGroup>>({
      id: group.id,
      name: group.name,
      parts: group.parts,
      extra: extraOf(group, KNOWN.group, ['groups', i]),
    });
  const toReadyMade = (ready: FileReadyMadeValve, i: number): ReadyMadeValve =>
    solid<Required<ReadyMadeValve>>({
      id: ready.id,
      title: ready.title,
      kind: ready.kind,
      valve: toValve(ready.valve, ['readyMadeValves', i, 'valve']),
      extra: extraOf(ready, KNOWN.readyMadeValve, ['readyMadeValves', i]),
    });
  const toRule = (rule: FileRule, i: number): RuleText =>
    solid<Required<RuleText>>({ id: rule.id, text: rule.text, extra: extraOf(rule, KNOWN.rule, ['rules', i]) });
  const toLoadCase = ({ id, name, loads, ...rest }: FileLoadCase, i: number): LoadCase =>
    solid<Required<LoadCase>>({ id, name, loads, extra: extraOf(rest, KNOWN.loadCase, ['loadCases', i]) });
  return solid<Required<Circuit>>({
    name: file.name,
    title: file.title,
    paper: file.paper,
    notes: file.notes,
    sheets: file.sheets?.map(toSheet),
    parts: file.parts.map(toPart),
    connections: file.connections.map(toConnection),
    labels: file.labels?.map(toLabel),
    groups: file.groups?.map(toGroup),
    readyMadeValves: file.readyMadeValves?.map(toReadyMade),
    rules: file.rules?.map(toRule),
    loadCases: file.loadCases?.map(toLoadCase),
    plans: file.plans?.map((plan, i) => toPlan(plan, i, extraOf)),
    extra: extraOf(file, KNOWN.circuit, []),
  });
}

function checkIds(circuit: Circuit): Problem[] {
  const problems: Problem[] = [];
  for (const field of LISTS) {
    const first = new Map<string, number>();
    for (const [i, { id }] of (circuit[field] ?? []).entries()) {
      const before = first.get(id);
      if (before === undefined) first.set(id, i);
      else
        problems.push({
          where: `${field}[${i}].id`,
          what: `The id "${id}" is taken by ${field}[${before}].`,
          remedy: 'Give it another id.',
        });
    }
  }
  const shown = new Map<string, Part>();
  for (const [i, part] of circuit.parts.entries()) {
    const other = shown.get(labelOf(part));
    if (other === undefined) shown.set(labelOf(part), part);
    else if (other.id !== part.id) {
      problems.push({
        where: part.label === undefined ? `parts[${i}].id` : `parts[${i}].label`,
        what: `The part ${other.id} is shown as "${labelOf(part)}" too, so the two could not be told apart.`,
        remedy: 'Give one of them another label.',
      });
    }
  }
  return [...problems, ...checkStepIds(circuit.plans ?? [])];
}

function checkSheets(circuit: Circuit): Problem[] {
  const known = new Set(circuit.sheets?.map(({ id }) => id));
  const listed = circuit.sheets?.map(({ id }) => `"${id}"`).join(', ');
  return (['parts', 'labels'] as const).flatMap((list) =>
    (circuit[list] ?? []).flatMap(({ sheet }, i): Problem[] =>
      sheet === undefined || known.has(sheet)
        ? []
        : [
            {
              where: `${list}[${i}].sheet`,
              what: `There is no sheet "${sheet}".`,
              remedy: listed
                ? `Write ${listed}, or leave the field out for the first sheet.`
                : 'List it under "sheets" with id and name, or leave the field out.',
            },
          ],
    ),
  );
}

function checkConnections(circuit: Circuit, warnings: Problem[]): Problem[] {
  const problems: Problem[] = [];
  const parts = new Set(circuit.parts.map((part) => part.id));
  const pairs = new Map<string, string>();
  for (const [i, { id, from, to }] of circuit.connections.entries()) {
    const where = `connections[${i}]`;
    for (const [end, ref] of [
      ['from', from],
      ['to', to],
    ] as const) {
      if (!parts.has(ref.part)) {
        problems.push({
          where: `${where}.${end}`,
          what: `There is no part "${ref.part}".`,
          remedy: 'Correct the part id, or remove the connection.',
        });
      }
    }
    const ends = [`${from.part}.${from.port}`, `${to.part}.${to.port}`].sort();
    if (ends[0] === ends[1]) {
      problems.push({
        where,
        what: `The connection goes from ${ends[0]} to itself.`,
        remedy: 'Connect it to another port, or remove it.',
      });
      continue;
    }
    const pair = ends.join(' ');
    const before = pairs.get(pair);
    if (before === undefined) pairs.set(pair, id);
    else
      warnings.push({
        where,
        what: `The connection "${before}" joins ${ends[0]} and ${ends[1]} already.`,
        remedy: 'Remove one of the two.',
      });
  }
  return problems;
}
