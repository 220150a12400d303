import type { Point, Turn } from '../../src/base/points.ts';
import type { Circuit, Connection, Part, PortRef, ValveData } from '../../src/circuit/model.ts';

/** Circuits in few words, for the tests of the drawing floor. */
export const ref = (text: string): PortRef => {
  const [part, port] = text.split('.') as [string, string];
  return { part, port };
};

/** `PU.P V1.P`, with anything else a connection may carry. */
export function joins(...texts: string[]): Connection[] {
  return texts.map((text, i) => {
    const [from, to] = text.split(' ') as [string, string];
    return { id: `c${i + 1}`, from: ref(from), to: ref(to) };
  });
}

export const part = (id: string, kind: string, at?: Point, turn: Turn = 0, flip = false): Part => ({
  id,
  kind,
  turn,
  flip,
  ...(at ? { at } : {}),
});

export const circuit = (parts: readonly Part[], connections: readonly Connection[] = []): Circuit => ({
  name: 'sample',
  parts,
  connections,
});

export const LEVER_VALVE: ValveData = {
  ports: [
    { id: 'A', side: 'top' },
    { id: 'B', side: 'top' },
    { id: 'P', side: 'bottom' },
    { id: 'T', side: 'bottom' },
  ],
  positions: [
    { name: 'out', paths: ['P-A', 'B-T'] },
    { name: 'hold', paths: ['P-T'] },
    { name: 'in', paths: ['P-B', 'A-T'] },
  ],
  rest: 1,
  left: ['lever', 'spring'],
  right: ['spring'],
};

export const valve = (id: string, at?: Point): Part => ({ ...part(id, 'directional-valve', at), valve: LEVER_VALVE });

/** Two sections on one pump; no part has a place. */
export function unplacedRig(): Circuit {
  const parts: Part[] = [
    part('PU', 'fixed-pump'),
    part('T0', 'tank'),
    part('RV', 'relief-valve'),
    part('T1', 'tank'),
    part('PG', 'gauge'),
    { ...valve('V1'), code: 'H1.1' },
    part('T2', 'tank'),
    { ...part('DLC', 'double-lock-check'), code: 'H1.2' },
    { ...part('C1', 'cylinder'), label: 'CLAMP', code: 'H1.3 50/28 × 80' },
    { ...valve('V2'), code: 'H2.1' },
    part('T3', 'tank'),
    part('TH', 'one-way-throttle'),
    { ...part('M1', 'motor'), label: 'FEED', code: 'H2.2 82 cm³' },
    part('T4', 'tank'),
  ];
  return {
    name: 'Clamp and feed',
    parts,
    connections: joins(
      'PU.S T0.T',
      'PU.P RV.P',
      'RV.T T1.T',
      'PU.P PG.M',
      'PU.P V1.P',
      'PU.P V2.P',
      'V1.T T2.T',
      'V1.A DLC.V1',
      'V1.B DLC.V2',
      'DLC.C1 C1.A',
      'DLC.C2 C1.B',
      'V2.T T3.T',
      'V2.A TH.A',
      'TH.B M1.A',
      'V2.B M1.B',
      'M1.L T4.T',
    ),
  };
}
