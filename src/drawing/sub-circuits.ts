import type { Box, Point } from '../base/points.ts';
import type { Circuit, Connection, Part, Setting } from '../circuit/model.ts';
import { readyMadeOf } from '../parts/catalogue.ts';

/** A few parts with their lines, placed in one go. */
export interface SubCircuit {
  readonly id: string;
  readonly title: string;
  /** One line in trade words. */
  readonly help: string;
  readonly words: readonly string[];
  /** About the sheet's origin. */
  readonly make: () => Circuit;
}

type Placed = readonly [id: string, ready: string, x: number, y: number, settings?: Readonly<Record<string, Setting>>];

function build(title: string, parts: readonly Placed[], lines: readonly string[]): Circuit {
  return {
    name: title,
    parts: parts.map(([id, ready, x, y, settings]): Part => {
      const entry = readyMadeOf(ready);
      if (!entry) throw new Error(`The catalogue has no ${ready}.`);
      const made = entry.readyMade.make();
      const all = { ...made.settings, ...settings };
      return {
        id,
        kind: entry.kind.kind,
        at: { x, y },
        ...(Object.keys(all).length > 0 && { settings: all }),
        ...(made.valve && { valve: made.valve }),
      };
    }),
    connections: lines.map((line, i): Connection => {
      const [from, to, use] = line.split(' ');
      return {
        id: `c${i + 1}`,
        from: ref(from ?? ''),
        to: ref(to ?? ''),
        ...(use === 'pilot' && { use }),
      };
    }),
  };
}

function ref(text: string): Connection['from'] {
  const dot = text.indexOf('.');
  return { part: text.slice(0, dot), port: text.slice(dot + 1) };
}

const sub = (
  id: string,
  title: string,
  help: string,
  words: readonly string[],
  parts: readonly Placed[],
  lines: readonly string[],
): SubCircuit => ({ id, title, help, words, make: () => build(title, parts, lines) });

/** Common practice: pump with its relief valve, sections with their actuators, a large and a small pump. */
export const SUB_CIRCUITS: readonly SubCircuit[] = [
  sub(
    'power-unit',
    'Power unit',
    'Pump, relief valve, tanks',
    ['supply', 'pump', 'relief', 'tank', 'aggregate'],
    [
      ['PUMP1', 'fixed-pump', -6, 2],
      ['TANK1', 'tank', -6, 10],
      ['RV1', 'relief-valve', 6, 2],
      ['TANK2', 'tank', 6, 10],
      ['J1', 'junction', -6, -8],
    ],
    ['PUMP1.P J1.J', 'PUMP1.S TANK1.T', 'J1.J RV1.P', 'RV1.T TANK2.T'],
  ),
  sub(
    'lever-section',
    'Lever section with its cylinder',
    '4/3 lever valve, pump unloaded in the middle, and the cylinder on it',
    ['lever', 'valve', 'cylinder', 'section'],
    [
      ['V1', 'valve-4/3-bypass', 0, 9],
      ['CYL1', 'cylinder', 0, -7],
    ],
    ['V1.A CYL1.A', 'V1.B CYL1.B'],
  ),
  sub(
    'bank-section',
    'Bank section with its cylinder',
    '6/3 lever valve that passes the oil on in the middle, and the cylinder on it',
    ['carry over', 'bank', 'lever', 'section', 'mobile'],
    [
      ['V1', 'valve-6/3-carry-over', 0, 9],
      ['CYL1', 'cylinder', 0, -7],
    ],
    ['V1.A CYL1.A', 'V1.B CYL1.B'],
  ),
  sub(
    'lock-section',
    'Locked section with its cylinder',
    'Lever valve that relieves both sides, double lock check, cylinder',
    ['lock', 'pilot check', 'hold', 'section'],
    [
      ['V1', 'valve-4/3-float', 0, 16],
      ['K1', 'double-lock-check', 0, 2],
      ['CYL1', 'cylinder', 0, -14],
    ],
    ['V1.A K1.V1', 'V1.B K1.V2', 'K1.C1 CYL1.A', 'K1.C2 CYL1.B'],
  ),
  sub(
    'unloading-pair',
    'Large and small pump',
    'The large pump is unloaded to tank when the pressure rises; the small one goes on',
    ['high low', 'two pumps', 'unloading', 'press'],
    [
      ['PUMP1', 'fixed-pump', -20, 8, { flow: '40 L/min' }],
      ['TANK1', 'tank', -20, 16],
      ['UV1', 'unloading-valve', -6, 8, { setting: '60 bar' }],
      ['TANK2', 'tank', -6, 16],
      ['J1', 'junction', -20, 1],
      ['CV1', 'check-valve', -20, -4],
      ['J2', 'junction', -20, -11],
      ['J3', 'junction', 10, -11],
      ['PUMP2', 'fixed-pump', 10, 8, { flow: '8 L/min' }],
      ['TANK3', 'tank', 10, 16],
      ['RV1', 'relief-valve', 24, 8, { setting: '200 bar' }],
      ['TANK4', 'tank', 24, 16],
    ],
    [
      'PUMP1.P J1.J',
      'J1.J UV1.P',
      'J1.J CV1.A',
      'CV1.B J2.J',
      'J2.J J3.J',
      'PUMP2.P J3.J',
      'J3.J RV1.P',
      'J2.J UV1.X pilot',
      'PUMP1.S TANK1.T',
      'UV1.T TANK2.T',
      'PUMP2.S TANK3.T',
      'RV1.T TANK4.T',
    ],
  ),
];

/** The circuit moved so that its middle stands on the origin, as far as whole modules go. */
export function centred(circuit: Circuit, boundsOf: (circuit: Circuit) => Box): Circuit {
  const { x, y, width, height } = boundsOf(circuit);
  const by = { x: Math.round(x + width / 2), y: Math.round(y + height / 2) };
  const moved = (p: Point): Point => ({ x: p.x - by.x, y: p.y - by.y });
  return {
    ...circuit,
    parts: circuit.parts.map((part) => (part.at ? { ...part, at: moved(part.at) } : part)),
    connections: circuit.connections.map((c) => (c.bends ? { ...c, bends: c.bends.map(moved) } : c)),
    ...(circuit.labels && { labels: circuit.labels.map((label) => ({ ...label, at: moved(label.at) })) }),
  };
}
