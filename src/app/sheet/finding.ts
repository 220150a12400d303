import { labelOf } from '../../circuit/model.ts';
import type { Circuit } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import type { Cursor } from './reading-order.ts';

/** Something on the sheet that has a name. */
export interface Found {
  readonly cursor: Cursor;
  readonly name: string;
  readonly what: string;
}

const MOST = 40;
const plain = (text: string): string => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase();

/**
 * Parts, lines, blocks and texts whose name, code or kind holds what is looked for; names that begin with it come first.
 * `lineName`: as the table calls the line of a connection.
 */
export function findOnSheet(
  circuit: Circuit,
  query: string,
  lineName: (connection: string) => string | undefined,
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
  for (const part of circuit.parts) {
    const kind = kindOf(part.kind)?.title ?? part.kind;
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
  for (const { name, parts } of circuit.groups ?? []) {
    const [first] = parts;
    if (first !== undefined) offer({ cursor: { type: 'part', id: first }, name, what: 'block' });
  }
  for (const { id, text } of circuit.labels ?? []) offer({ cursor: { type: 'label', id }, name: text, what: 'text' });
  return found
    .sort((a, b) => a.rank - b.rank)
    .slice(0, MOST)
    .map(({ item }) => item);
}
