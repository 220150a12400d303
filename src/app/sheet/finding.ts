import { labelOf } from '../../circuit/model.ts';
import type { Circuit, Part } from '../../circuit/model.ts';
import { portSpecs } from '../../drawing/shapes.ts';
import { kindOf } from '../../parts/catalogue.ts';
import type { Cursor } from './reading-order.ts';

/** Something on the sheet that has a name. */
export interface Found {
  readonly cursor: Cursor;
  readonly name: string;
  readonly what: string;
}

const MOST = 40;
/** `V1 A` as `V1.A`. */
const dotted = (text: string): string => text.replace(/[\s.]+/g, '.');
const plain = (text: string): string => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase();

/**
 * Parts, lines, blocks and texts whose name, code or kind holds what is looked for; names that begin with it come first.
 * Ports are found by their full name, `V1.A` or `V1 A`. `ends`: only what a line can end at.
 * `lineName`: as the table calls the line of a connection.
 */
export function findOnSheet(
  circuit: Circuit,
  query: string,
  lineName: (connection: string) => string | undefined,
  ends = false,
): Found[] {
  const wanted = plain(query.trim());
  if (wanted === '') return [];
  const found: { readonly item: Found; readonly rank: number }[] = [];
  const offer = (item: Found, ...more: (string | undefined)[]): void => {
    const name = plain(item.name);
    const rank =
      name === wanted
        ? 0
        : name.startsWith(wanted)
          ? 1
          : name.includes(wanted)
            ? 2
            : more.some((text) => text !== undefined && plain(text).includes(wanted))
              ? 3
              : -1;
    if (rank >= 0) found.push({ item, rank });
  };
  const inPort = dotted(wanted);
  const offerPorts = (part: Part, kind: string): void => {
    const owner = dotted(plain(labelOf(part)));
    // Without the dot a part is meant, whose ports would only crowd the list.
    if (!ends && !inPort.startsWith(`${owner}.`)) return;
    for (const { id } of portSpecs(part)) {
      const name = `${owner}.${plain(id)}`;
      const rank = name === inPort ? 0 : name.startsWith(inPort) ? 1 : ends && name.includes(inPort) ? 2 : -1;
      if (rank < 0) continue;
      const cursor = { type: 'port', part: part.id, port: id } as const;
      found.push({ item: { cursor, name: `${labelOf(part)}.${id}`, what: `port of ${kind.toLowerCase()}` }, rank });
    }
  };
  for (const part of circuit.parts) {
    const kind = kindOf(part.kind)?.title ?? part.kind;
    offerPorts(part, kind);
    if (ends) continue;
    offer(
      {
        cursor: { type: 'part', id: part.id },
        name: labelOf(part),
        what: [kind, part.code].filter(Boolean).join(', '),
      },
      part.id,
      part.code,
      kind,
    );
  }
  const named = new Set<string>();
  for (const { id, name, from, to, size } of circuit.connections) {
    const shown = name ?? lineName(id);
    if (shown === undefined || named.has(shown)) continue;
    named.add(shown);
    offer(
      {
        cursor: { type: 'connection', id },
        name: shown,
        what: `line from ${from.part}.${from.port} to ${to.part}.${to.port}`,
      },
      size,
    );
  }
  if (ends) return sorted(found);
  for (const { name, parts } of circuit.groups ?? []) {
    const [first] = parts;
    if (first !== undefined) offer({ cursor: { type: 'part', id: first }, name, what: 'block' });
  }
  for (const { id, text } of circuit.labels ?? []) offer({ cursor: { type: 'label', id }, name: text, what: 'text' });
  return sorted(found);
}

const sorted = (found: readonly { readonly item: Found; readonly rank: number }[]): Found[] =>
  [...found]
    .sort((a, b) => a.rank - b.rank)
    .slice(0, MOST)
    .map(({ item }) => item);
