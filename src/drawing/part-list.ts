import type { Circuit, Part, Setting } from '../circuit/model.ts';
import { labelOf } from '../circuit/model.ts';
import { sheetNumber, sheetOf } from '../circuit/sheets.ts';
import { kindOf } from '../parts/catalogue.ts';

/** Parts that are alike in kind and size, as one entry of the part list. */
export interface PartListEntry {
  /** 1-based. */
  readonly item: number;
  readonly codes: readonly string[];
  readonly labels: readonly string[];
  readonly kind: string;
  /** What sizes it, as it was entered; what nobody entered is not in it. */
  readonly data: string;
  /** Numbers of the sheets that they stand on, rising. */
  readonly sheets: readonly number[];
  readonly count: number;
}

/** No parts to order: points of a line. */
const POINTS: ReadonlySet<string> = new Set(['junction']);
/** What the machine does to a part, not what the part is. */
const NO_SIZE: ReadonlySet<string> = new Set(['load', 'loadSense', 'friction', 'place', 'worked', 'strokesPerMinute']);

/** In the order of the codes; parts without one follow in the order of the document. All tank symbols are one tank. */
export function partList(circuit: Circuit): PartListEntry[] {
  const groups = new Map<string, { parts: Part[]; kind: string; data: string }>();
  for (const part of circuit.parts) {
    if (POINTS.has(part.kind)) continue;
    const [kind, data] = [kindOf(part.kind)?.title ?? part.kind, sizeOf(part)];
    // Spools may differ beyond what is said of them.
    const { ports, positions, crossovers } = part.valve ?? {};
    const key = JSON.stringify([part.kind, data, ports, positions, crossovers]);
    const group = groups.get(key);
    if (group) group.parts.push(part);
    else groups.set(key, { parts: [part], kind, data });
  }
  const entries = [...groups.values()].map(({ parts, kind, data }) => {
    const isTank = parts.every((part) => part.kind === 'tank');
    return {
      codes: parts.flatMap(({ code }) => code ?? []).sort(byCode),
      labels: isTank ? parts.slice(0, 1).map(labelOf) : parts.map(labelOf),
      kind,
      data: isTank && parts.length > 1 ? [data, `drawn ${parts.length} times`].filter(Boolean).join('; ') : data,
      sheets: [...new Set(parts.map((part) => sheetNumber(circuit, sheetOf(circuit, part))))].sort((a, b) => a - b),
      count: isTank ? 1 : parts.length,
    };
  });
  const coded = entries
    .filter(({ codes }) => codes.length > 0)
    .sort((a, b) => byCode(a.codes[0] ?? '', b.codes[0] ?? ''));
  const bare = entries.filter(({ codes }) => codes.length === 0);
  return [...coded, ...bare].map((entry, i) => ({ item: i + 1, ...entry }));
}

/** `H2.10` after `H2.9`; free of the machine's language. */
export function byCode(a: string, b: string): number {
  const [left, right] = [pieces(a), pieces(b)];
  for (let i = 0; i < Math.max(left.length, right.length); i++) {
    const [x = '', y = ''] = [left[i], right[i]];
    if (x === y) continue;
    const [m, n] = [Number(x), Number(y)];
    if (x !== '' && y !== '' && Number.isFinite(m) && Number.isFinite(n) && m !== n) return m - n;
    return x < y ? -1 : 1;
  }
  return 0;
}

const pieces = (code: string): readonly string[] => code.match(/\d+|\D+/g) ?? [];

function sizeOf(part: Part): string {
  const specs = kindOf(part.kind)?.settings ?? [];
  const said = specs.flatMap(({ id, title, value }) => {
    const typed = part.settings?.[id];
    if (typed === undefined || NO_SIZE.has(id) || value.type === 'actuator') return [];
    const text = sayTyped(typed);
    return text === undefined ? [] : [text === '' ? title.toLowerCase() : `${title.toLowerCase()} ${text}`];
  });
  return [...valveWords(part), ...said].join(', ');
}

/** Undefined: a switch that is off says nothing. */
function sayTyped(typed: Setting): string | undefined {
  if (typeof typed === 'boolean') return typed ? '' : undefined;
  return String(typed);
}

function valveWords({ valve }: Part): string[] {
  if (!valve) return [];
  const operators = [...new Set([...valve.left, ...valve.right])].join(', ');
  const ways = `${valve.ports.length}/${valve.positions.length}`;
  const rest = valve.rest === undefined ? undefined : valve.positions[valve.rest];
  return [
    `${ways} (${valve.positions.map(({ name }) => name).join(', ')})`,
    ...(rest ? [`at rest ${rest.paths.length > 0 ? rest.paths.join(' ') : 'all shut'}`] : []),
    ...(operators === '' ? [] : [operators]),
  ];
}
