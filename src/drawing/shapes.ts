import type { Box, Placement, Point, Side } from '../base/points.ts';
import { place, placeBox, placeSide } from '../base/points.ts';
import type { Part, PortRef } from '../circuit/model.ts';
import { kindOf } from '../parts/catalogue.ts';
import type { PortSpec } from '../parts/contract.ts';
import type { DrawnKind } from './reference-symbol.ts';
import { isReference, referenceKind } from './reference-symbol.ts';

/** Parts of a kind that the catalogue does not know are still shown, as an empty box. */
const UNKNOWN_BOUNDS: Box = { x: -2, y: -2, width: 4, height: 4 };
const ORIGIN: Point = { x: 0, y: 0 };

export interface PlacedPort {
  readonly ref: PortRef;
  readonly at: Point;
  readonly side: Side;
  readonly role: PortSpec['role'];
}

export const placementOf = (part: Part): Placement => ({
  at: part.at ?? ORIGIN,
  turn: part.turn ?? 0,
  flip: part.flip ?? false,
});

/** References to other sheets are drawn and reached like parts. */
export const drawnKind = (part: Part): DrawnKind | undefined => (isReference(part) ? referenceKind : kindOf(part.kind));

export const ownBox = (part: Part): Box => drawnKind(part)?.bounds(part) ?? UNKNOWN_BOUNDS;

/** Parts are never changed in place, so what follows from one is computed once. */
function once<T>(of: (part: Part) => T): (part: Part) => T {
  const known = new WeakMap<Part, T>();
  return (part) => {
    let value = known.get(part);
    if (value === undefined) known.set(part, (value = of(part)));
    return value;
  };
}

export const portSpecs: (part: Part) => readonly PortSpec[] = once((part) => drawnKind(part)?.ports(part) ?? []);

/** The part's outline on the sheet. */
export const partBox: (part: Part) => Box = once((part) => placeBox(ownBox(part), placementOf(part)));

/** The outline over all positions: what lines, names and other parts keep clear of. */
export const partReach: (part: Part) => Box = once((part) => {
  const own = drawnKind(part)?.reach?.(part);
  return own ? placeBox(own, placementOf(part)) : partBox(part);
});

export const placedPorts: (part: Part) => readonly PlacedPort[] = once((part) => {
  const placement = placementOf(part);
  return portSpecs(part).map((port) => ({
    ref: { part: part.id, port: port.id },
    at: place(port.at, placement),
    side: placeSide(port.side, placement),
    role: port.role,
  }));
});
