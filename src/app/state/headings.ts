import { placeSide } from '../../base/points.ts';
import type { Side } from '../../base/points.ts';
import type { Circuit } from '../../circuit/model.ts';

const DEGREES: Readonly<Record<Side, number>> = { right: 0, down: 90, left: 180, up: 270 };

/** Part id → where the rod points on the sheet, degrees clockwise from right. The unturned rod points right. */
export function headings(circuit: Circuit): ReadonlyMap<string, number> {
  return new Map(
    circuit.parts.map((part) => [
      part.id,
      DEGREES[placeSide('right', { turn: part.turn ?? 0, flip: part.flip ?? false })],
    ]),
  );
}
