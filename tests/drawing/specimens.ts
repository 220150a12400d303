import type { Point, Turn } from '../../src/base/points.ts';
import { place, placeSide, vector } from '../../src/base/points.ts';
import type { Circuit, Connection, Operator, Part, ValveData } from '../../src/circuit/model.ts';
import { portSpecs } from '../../src/drawing/shapes.ts';
import { CATALOGUE, kindOf } from '../../src/parts/catalogue.ts';
import type { Look, PartKind } from '../../src/parts/contract.ts';
import { CENTRES } from '../../src/parts/valve-forms.ts';

/** One symbol to be looked at: a part without a place, and how it is shown. */
export interface Specimen {
  readonly name: string;
  readonly part: Part;
  readonly look: Look;
}

export interface Stand {
  readonly turn: Turn;
  readonly flip: boolean;
}

/** All eight ways in which a symbol can stand. */
export const STANDS: readonly Stand[] = [false, true].flatMap((flip) =>
  ([0, 90, 180, 270] as const).map((turn) => ({ turn, flip })),
);

/**
 * Every ready-made form, every choice and switch of every kind, every position, and valves that nobody offers
 * ready-made; of those that are drawn alike the first.
 */
export function specimens(): Specimen[] {
  const all = [
    ...CATALOGUE.flatMap(ofKind),
    ...MADE.map(([name, valve]) => specimen(name, 'directional-valve', { valve })),
  ];
  const seen = new Set<string>();
  return all.filter(({ part, look }) => {
    const drawn = JSON.stringify([part.kind, kindOf(part.kind)?.draw(part, look)]);
    return !seen.has(drawn) && seen.add(drawn);
  });
}

const specimen = (name: string, kind: string, rest: Pick<Part, 'settings' | 'valve'>, look: Look = {}): Specimen => ({
  name,
  part: { id: 'S', kind, ...rest },
  look,
});

function ofKind(kind: PartKind): Specimen[] {
  const out = kind.readyMade.map((form) => specimen(form.title, kind.kind, form.make()));
  const [first] = out;
  if (!first) return out;
  for (const { id, value } of kind.settings) {
    const options: readonly (string | boolean)[] =
      value.type === 'choice' ? value.options : value.type === 'switch' ? [true, false] : [];
    for (const option of options) {
      const settings = { ...first.part.settings, [id]: option };
      out.push(specimen(`${kind.title}: ${id} ${option}`, kind.kind, { ...first.part, settings }));
    }
  }
  if (kind.kind === 'check-valve')
    out.push(specimen('Check valve: sprung', kind.kind, { settings: { cracking: '3 bar' } }));
  // Choices that show only together with another: which way the spring of a cylinder pushes, at both stops.
  if (kind.group === 'Motion')
    for (const { part, name } of [...out])
      for (const stroke of [0, 1])
        out.push(specimen(`${name}, ${stroke === 0 ? 'in' : 'out'}`, kind.kind, part, { stroke }));
  for (const each of [...out]) {
    const spec = kind.dependent?.(each.part) ?? kind.input?.(each.part);
    spec?.positions.forEach((called, position) => {
      if (position !== (spec.rest ?? 0))
        out.push(specimen(`${each.name} in ${called}`, kind.kind, each.part, { position }));
    });
  }
  return out;
}

const PORTS: ValveData['ports'] = [
  { id: 'A', side: 'top' },
  { id: 'B', side: 'top' },
  { id: 'P', side: 'bottom' },
  { id: 'T', side: 'bottom' },
];

const OPERATORS: readonly Operator[] = ['lever', 'pedal', 'button', 'coil', 'spring', 'detent', 'hand', 'roller'];

const made = (
  left: readonly Operator[],
  right: readonly Operator[],
  ports = PORTS,
  centre: readonly string[] = [],
): ValveData => {
  const coils = [...left, ...right].filter((each) => each === 'coil');
  return {
    ports,
    positions: [
      { name: 'out', paths: ['P-A', 'B-T'] },
      { name: 'mid', paths: centre },
      { name: 'in', paths: ['P-B', 'A-T'] },
    ],
    rest: 1,
    left,
    right,
    coils: coils.map((_, i) => ({ name: `12Y${i + 1}`, position: 2 * i })),
  };
};

/** What the valve maker can make besides: every operator at each end, two and three at an end, many ports, long letters. */
const MADE: readonly (readonly [string, ValveData])[] = [
  ...OPERATORS.map((each) => [`${each} and spring`, made([each, 'spring'], [each])] as const),
  ...OPERATORS.map((each) => [`coil and ${each}`, made(['coil', each], ['coil', each, 'spring'])] as const),
  ['two coils at an end', made(['coil', 'coil'], ['coil', 'coil', 'spring'])],
  [
    'eight ways',
    made(
      ['lever'],
      ['spring'],
      ['A', 'B', 'C1', 'C2', 'P', 'T', 'X', 'Y'].map((id, i) => ({ id, side: i < 4 ? 'top' : 'bottom' })),
      ['P~>A', 'C1-C2', 'X>B'],
    ),
  ],
  [
    'three at one edge',
    made(
      ['coil'],
      ['spring'],
      [...'ABC'].map((id) => ({ id, side: 'top' }) as const),
      ['A-B-C'],
    ),
  ],
  ['throttled and one-way', made(['pedal'], ['spring'], PORTS, ['P~A', 'B>T'])],
  ['throttled one-way', made(['hand'], ['detent'], PORTS, ['P~>A', 'B~>T'])],
  ...CENTRES.filter(({ id }) => id === 'joined').map(
    ({ id, paths }) => [`centre ${id}`, made(['roller'], ['spring'], PORTS, paths)] as const,
  ),
];

/** The specimen on a sheet, with a short line at every port. */
export function standing({ part }: Specimen, { turn, flip }: Stand, at: Point, id = 'S'): Circuit {
  const placement = { turn, flip, at };
  const placed: Part = { ...part, id, label: 'NAME1', code: 'H1.1', ...placement };
  const ends: Part[] = [];
  const connections: Connection[] = [];
  for (const spec of portSpecs(placed)) {
    if (spec.role === 'joint') continue;
    const port = place(spec.at, placement);
    const out = vector(placeSide(spec.side, placement));
    const end = `${id}-${spec.id}`;
    ends.push({ id: end, kind: 'junction', at: { x: port.x + 3 * out.x, y: port.y + 3 * out.y } });
    const use = spec.role === 'pilot' || spec.role === 'drain' ? spec.role : 'working';
    connections.push({ id: `${id}.${spec.id}`, from: { part: id, port: spec.id }, to: { part: end, port: 'J' }, use });
  }
  return { name: 'specimens', parts: [placed, ...ends], connections };
}
