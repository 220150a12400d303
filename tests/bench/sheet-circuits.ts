import type { Circuit } from '../../src/circuit/model.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { circuit } from '../notation.ts';

/** One drive of ten parts, as they stand on sheets by the dozen. */
const DRIVE = placeMissing(
  circuit(
    [
      'P fixed-pump, R relief-valve, T tank, F filter, N check-valve, G gauge',
      'V directional-valve:valve-4/3-bypass, D one-way-throttle, K double-lock-check, C cylinder',
    ]
      .join(', ')
      .concat(' | P.P N.A | N.B V.P G.M R.P | V.T F.A | F.B R.T T.T P.S | V.A K.V1 | V.B K.V2 | K.C1 D.A | D.B C.A')
      .concat(' | K.C2 C.B'),
  ),
);
const ACROSS = 10;
const PITCH = { x: 56, y: 92 };

/**
 * So many parts of drives side by side, the returns of neighbours joined, so that lines reach over them.
 * Few of the valves have a lever of their own; the table of a sheet is not what is measured.
 */
export function sheetOf(count: number): Circuit {
  const drives = Math.ceil(count / DRIVE.parts.length);
  const parts: Circuit['parts'][number][] = [];
  const connections: Circuit['connections'][number][] = [];
  for (let i = 0; i < drives; i++) {
    const by = { x: (i % ACROSS) * PITCH.x, y: Math.floor(i / ACROSS) * PITCH.y };
    const name = (id: string): string => `${id}${i + 1}`;
    for (const part of DRIVE.parts)
      parts.push({ ...part, id: name(part.id), at: { x: (part.at?.x ?? 0) + by.x, y: (part.at?.y ?? 0) + by.y } });
    for (const { id, from, to } of DRIVE.connections)
      connections.push({
        id: name(`${id}-`),
        from: { ...from, part: name(from.part) },
        to: { ...to, part: name(to.part) },
      });
    if (i % ACROSS > 0)
      connections.push({
        id: name('return'),
        from: { part: `F${i}`, port: 'B' },
        to: { part: name('F'), port: 'B' },
      });
  }
  const kept = new Set(parts.slice(0, count).map(({ id }) => id));
  return {
    name: 'bench',
    parts: parts.slice(0, count),
    connections: connections.filter(({ from, to }) => kept.has(from.part) && kept.has(to.part)),
  };
}
