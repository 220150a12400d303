import type { Point } from '../base/points.ts';
import { bendsBefore } from './build.ts';
import { all, changeConnection, type Edit } from './edit.ts';
import { omit } from './fields.ts';
import { CONNECTION_PREFIX, connectionNames } from './ids.ts';
import type { Circuit, Connection, Part, Setting } from './model.ts';
import { partOf } from './place.ts';
import { RefusedEdit } from './refused.ts';

/**
 * Cuts a connection and joins the two ends to a part that is on the sheet: the near end to `entry`, the far end to
 * `exit`. The near half keeps id and name. `at`: where it is cut, to share the bends out.
 */
export function insertInto(
  circuit: Circuit,
  connectionId: string,
  part: string,
  ports: { readonly entry: string; readonly exit: string },
  at: Point,
): Edit {
  const old = circuit.connections.find((c) => c.id === connectionId);
  if (!old) throw new RefusedEdit(connectionId, 'That line is gone.', 'Choose another line.');
  partOf(circuit, part);
  const isEnd = old.from.part === part || old.to.part === part;
  if (isEnd) throw new RefusedEdit(part, 'This part is an end of that line already.', 'Choose another line.');
  const bends = old.bends ?? [];
  const cut = bendsBefore(circuit, old, at);
  const [before, after] = [bends.slice(0, cut), bends.slice(cut)];
  const onward: Connection = {
    ...omit(old, 'name', 'bends', 'id'),
    id: connectionNames(circuit).fresh(CONNECTION_PREFIX),
    from: { part, port: ports.exit },
    ...(after.length > 0 && { bends: after }),
  };
  return all([
    changeConnection(old.id, {
      to: { part, port: ports.entry },
      ...(old.bends && { bends: before.length > 0 ? before : undefined }),
    }),
    { type: 'put-connection', index: circuit.connections.indexOf(old) + 1, connection: onward },
  ]);
}

/** What a part becomes, and what of the old one fits it. */
export interface SwapInto {
  readonly kind: string;
  readonly settings?: Readonly<Record<string, Setting>> | undefined;
  readonly valve?: Part['valve'] | undefined;
  /** Its port letters. */
  readonly ports: readonly string[];
  /** Ids of settings of the old part that mean the same in the new one. */
  readonly keeps: ReadonlySet<string>;
}

export interface Swapped {
  readonly edit: Edit;
  /** Ports whose lines go, and settings that have no place any more; both of the old part. */
  readonly lostPorts: readonly string[];
  readonly lostSettings: readonly string[];
}

/** Makes another kind of a part. It keeps id, name, place and turn, lines at ports of the same letter, settings that fit. */
export function swapPart(circuit: Circuit, id: string, into: SwapInto): Swapped {
  const part = partOf(circuit, id);
  const had = Object.entries(part.settings ?? {});
  const kept = Object.fromEntries(had.filter(([key]) => into.keeps.has(key)));
  const settings = { ...into.settings, ...kept };
  const ports = new Set(into.ports);
  const isLost = (ref: { readonly part: string; readonly port: string }): boolean =>
    ref.part === id && !ports.has(ref.port);
  const cut = circuit.connections.filter(({ from, to }) => isLost(from) || isLost(to));
  const lostPorts = new Set(cut.flatMap(({ from, to }) => [from, to].filter(isLost).map(({ port }) => port)));
  return {
    edit: all([
      ...cut.map((c): Edit => ({ type: 'remove-connection', id: c.id })),
      {
        type: 'change-part',
        id,
        fields: {
          kind: into.kind,
          ...(Object.keys(settings).length > 0 && { settings }),
          ...(into.valve && { valve: into.valve }),
        },
        without: [
          ...(Object.keys(settings).length > 0 ? [] : (['settings'] as const)),
          ...(into.valve ? [] : (['valve'] as const)),
        ],
      },
    ]),
    lostPorts: [...lostPorts],
    lostSettings: had.filter(([key]) => !into.keeps.has(key)).map(([key]) => key),
  };
}
