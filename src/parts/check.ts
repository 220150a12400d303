import type { Problem } from '../base/result.ts';
import { labelOf, sayPort, type Circuit, type Part, type PortRef } from '../circuit/model.ts';
import { CATALOGUE, kindOf } from './catalogue.ts';
import type { PartKind, PartProblem } from './contract.ts';
import { checkReadyValves } from './file-valves.ts';
import { checkSettings } from './settings.ts';
import { isStripValve } from './valve-kinds.ts';

/** A problem of the circuit as drawn; `where` is a path in the file, `what` names the part in words. */
export interface CircuitProblem extends Problem {
  readonly level: 'error' | 'warning';
  /** Ids of the parts it is about. */
  readonly parts: readonly string[];
}

/** Number of single-letter edits from one word to another. */
function editDistance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, index) => index);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      const swap = (row[j - 1] as number) + (a[i - 1] === b[j - 1] ? 0 : 1);
      next.push(Math.min(swap, (row[j] as number) + 1, (next[j - 1] as number) + 1));
    }
    row = next;
  }
  return row[b.length] as number;
}

/** Known kinds nearest to a name, at most three, none that has little to do with it. */
export function nearestKinds(name: string): string[] {
  const wanted = name.toLowerCase();
  const shared = (kind: string): boolean =>
    wanted !== '' &&
    (kind.includes(wanted) || wanted.split(/[^a-z]+/).some((word) => word.length > 3 && kind.includes(word)));
  return CATALOGUE.map(({ kind }) => ({ kind, distance: editDistance(wanted, kind) - (shared(kind) ? 4 : 0) }))
    .filter(({ kind, distance }) => distance <= Math.max(2, kind.length / 2))
    .sort((a, b) => a.distance - b.distance || a.kind.localeCompare(b.kind))
    .slice(0, 3)
    .map(({ kind }) => kind);
}

function checkKind(part: Part, index: number): CircuitProblem[] {
  const near = nearestKinds(part.kind);
  const choice = near.length > 0 ? near : CATALOGUE.map((kind) => kind.kind);
  return [
    {
      level: 'error',
      parts: [part.id],
      where: `parts[${index}].kind`,
      what: `${labelOf(part)}: there is no kind of part "${part.kind}".`,
      remedy: near.length > 0 ? `Did you mean ${choice.join(' or ')}?` : `Use one of ${choice.join(', ')}.`,
    },
  ];
}

function checkPart(part: Part, index: number): CircuitProblem[] {
  const kind = kindOf(part.kind);
  if (!kind) return checkKind(part, index);
  const stray: PartProblem[] =
    part.valve && !isStripValve(kind.kind)
      ? [
          {
            level: 'warning',
            where: 'valve',
            what: `A ${kind.title.toLowerCase()} has no valve data; they do nothing here.`,
            remedy: 'Delete them, or use a directional valve.',
          },
        ]
      : [];
  return [...checkSettings(part, kind.settings), ...stray, ...(kind.check?.(part) ?? [])].map((problem) => ({
    level: problem.level ?? 'error',
    parts: [part.id],
    where: `parts[${index}].${problem.where}`,
    what: `${labelOf(part)}: ${problem.what}`,
    remedy: problem.remedy,
  }));
}

/** A setting that names an actuator names one that the circuit has. */
function checkNamed(circuit: Circuit): CircuitProblem[] {
  return circuit.parts.flatMap((part, index) =>
    (kindOf(part.kind)?.settings ?? []).flatMap((spec): CircuitProblem[] => {
      const id = part.settings?.[spec.id];
      if (spec.value.type !== 'actuator' || typeof id !== 'string' || id === '') return [];
      const named = circuit.parts.find((other) => other.id === id);
      const kind = named && kindOf(named.kind);
      if (named && kind?.elements(named).some((element) => element.type === 'actuator')) return [];
      return [
        {
          level: 'warning',
          parts: [part.id],
          where: `parts[${index}].settings.${spec.id}`,
          what: `${labelOf(part)}: ${named ? `${labelOf(named)} is no actuator` : `there is no part "${id}"`}.`,
          remedy: 'Name a cylinder or motor of this circuit.',
        },
      ];
    }),
  );
}

function checkLabels(circuit: Circuit): CircuitProblem[] {
  const problems: CircuitProblem[] = [];
  const byLabel = new Map<string, Part>();
  const byId = new Map<string, Part>();
  circuit.parts.forEach((part, index) => {
    const twin = byId.get(part.id);
    if (twin) {
      problems.push({
        level: 'error',
        parts: [part.id],
        where: `parts[${index}].id`,
        what: `Two parts have the id "${part.id}".`,
        remedy: 'Give each part its own id.',
      });
    }
    byId.set(part.id, part);
    // The id stands in for an absent label, so a label can also clash with another part's id.
    const label = labelOf(part);
    const earlier = byLabel.get(label);
    if (earlier && earlier.id !== part.id) {
      problems.push({
        level: 'error',
        parts: [earlier.id, part.id],
        where: `parts[${index}].label`,
        what: `Two parts are called "${label}" (${earlier.id} and ${part.id}).`,
        remedy: 'Give each part its own label.',
      });
    }
    if (!earlier) byLabel.set(label, part);
  });
  return problems;
}

function checkConnections(circuit: Circuit): CircuitProblem[] {
  const parts = new Map<string, { part: Part; kind: PartKind | undefined }>();
  for (const part of circuit.parts) parts.set(part.id, { part, kind: kindOf(part.kind) });

  const checkEnd = (ref: PortRef, where: string): CircuitProblem[] => {
    const found = parts.get(ref.part);
    if (!found) {
      return [
        {
          level: 'error',
          parts: [],
          where,
          what: `The connection ends at ${sayPort(ref)}, but there is no part "${ref.part}".`,
          remedy: 'Connect it to a part of the circuit, or delete it.',
        },
      ];
    }
    // An unknown kind is reported once, at the part.
    if (!found.kind) return [];
    const ports = found.kind.ports(found.part).map((port) => port.id);
    if (ports.includes(ref.port)) return [];
    return [
      {
        level: 'error',
        parts: [ref.part],
        where,
        what: `${labelOf(found.part)} has no port ${ref.port}, where a connection ends.`,
        remedy: `Its ports are ${ports.join(', ')}.`,
      },
    ];
  };

  const ids = new Set<string>();
  const drawn = new Set<string>();
  return circuit.connections.flatMap((connection, index): CircuitProblem[] => {
    const where = `connections[${index}]`;
    const { from, to } = connection;
    const problems = [...checkEnd(from, `${where}.from`), ...checkEnd(to, `${where}.to`)];
    if (from.part === to.part && from.port === to.port) {
      problems.push({
        level: 'error',
        parts: [from.part],
        where,
        what: `The connection leads from ${sayPort(from)} to itself.`,
        remedy: 'Lead it to another port, or delete it.',
      });
    }
    if (ids.has(connection.id)) {
      problems.push({
        level: 'error',
        parts: [],
        where: `${where}.id`,
        what: `Two connections have the id "${connection.id}".`,
        remedy: 'Give each connection its own id.',
      });
    }
    ids.add(connection.id);
    const ends = [sayPort(from), sayPort(to)].sort().join(' ');
    if (drawn.has(ends)) {
      problems.push({
        level: 'warning',
        parts: [from.part, to.part],
        where,
        what: `${sayPort(from)} and ${sayPort(to)} are connected twice.`,
        remedy: 'Delete one of the two.',
      });
    }
    drawn.add(ends);
    return problems;
  });
}

/** Loads of cases: parts that are gone are a warning, since deleting a part does not ask its load cases. */
function checkLoadCases(circuit: Circuit): CircuitProblem[] {
  const parts = new Map(circuit.parts.map((part) => [part.id, part]));
  return (circuit.loadCases ?? []).flatMap((entry, index) =>
    Object.entries(entry.loads).flatMap(([id, loads]): CircuitProblem[] => {
      const where = `loadCases[${index}].loads.${id}`;
      const part = parts.get(id);
      const kind = part && kindOf(part.kind);
      if (!part) {
        return [
          {
            level: 'warning',
            parts: [],
            where,
            what: `Load case "${entry.name}" loads ${id}, but there is no such part.`,
            remedy: 'Delete this load, or give it the id of an actuator.',
          },
        ];
      }
      if (!kind) return [];
      const loaded = { ...part, settings: { ...part.settings, ...loads } };
      const known = new Set(checkSettings(part, kind.settings).map((problem) => problem.what));
      return [...checkSettings(loaded, kind.settings), ...(kind.check?.(loaded) ?? [])]
        .filter((problem) => !known.has(problem.what))
        .map((problem) => ({
          level: problem.level ?? 'error',
          parts: [id],
          where: `${where}.${problem.where.replace(/^settings\./, '')}`,
          what: `Load case "${entry.name}", ${labelOf(part)}: ${problem.what}`,
          remedy: problem.remedy,
        }));
    }),
  );
}

/**
 * Everything wrong with the parts and connections of a circuit, in file order: unknown kinds, settings
 * that cannot be used, valve data, labels and connections that end nowhere. Never throws.
 */
export function checkParts(circuit: Circuit): CircuitProblem[] {
  return [
    ...circuit.parts.flatMap(checkPart),
    ...checkNamed(circuit),
    ...checkLabels(circuit),
    ...checkConnections(circuit),
    ...checkLoadCases(circuit),
    ...checkReadyValves(circuit).map(({ level = 'error', ...problem }) => ({ ...problem, level, parts: [] })),
  ];
}
