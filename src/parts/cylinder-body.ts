import type { Primitive } from '../base/primitives.ts';
import type { Part } from '../circuit/model.ts';
import type { Look, PartProblem, PortSpec } from './contract.ts';
import { quantitySetting, readSetting, readSi, type QuantitySpec } from './settings.ts';
import { boxOf, leftOpen, port, rectangle, stroke } from './shapes.ts';

/** What the cylinders share: bore, rod and stroke, the areas that follow, and the barrel. */
export const boreSetting = (preset: string): QuantitySpec =>
  quantitySetting({ id: 'bore', title: 'Bore', help: 'Diameter of the piston.' }, 'length', preset, {
    min: '1 mm',
    max: '3000 mm',
  });

export const rodSetting = (preset: string): QuantitySpec =>
  quantitySetting({ id: 'rod', title: 'Rod', help: 'Diameter of the rod; smaller than the bore.' }, 'length', preset, {
    min: '0.5 mm',
    max: '3000 mm',
  });

export const strokeSetting = (preset: string): QuantitySpec =>
  quantitySetting({ id: 'stroke', title: 'Stroke', help: 'Way from stop to stop.' }, 'length', preset, {
    min: '1 mm',
    max: '50000 mm',
  });

/** m² from diameters in m: piston area A = π·d²/4, annulus a = A less the rod's area. */
export function areasOf(bore: number, rod: number): { readonly piston: number; readonly annulus: number } {
  const piston = (Math.PI / 4) * bore ** 2;
  return { piston, annulus: piston - (Math.PI / 4) * rod ** 2 };
}

/** Areas of a part; a rod that does not fit its bore is left out of the annulus and reported by `checkBoreAndRod`. */
export function readAreas(
  part: Part,
  bore: QuantitySpec,
  rod: QuantitySpec,
): { readonly piston: number; readonly annulus: number } {
  const bored = readSi(part, bore);
  const areas = areasOf(bored, readSi(part, rod));
  return areas.annulus > 0 ? areas : { piston: areas.piston, annulus: areas.piston };
}

export function checkBoreAndRod(part: Part, bore: QuantitySpec, rod: QuantitySpec): PartProblem[] {
  const bored = readSetting(part, bore);
  const rodded = readSetting(part, rod);
  if (bored.si > rodded.si) return [];
  const say = (reading: { typed?: unknown }, preset: string): string =>
    reading.typed === undefined ? `${preset}, assumed` : String(reading.typed);
  return [
    {
      where: rodded.assumed && !bored.assumed ? 'settings.bore' : 'settings.rod',
      what: `The rod (${say(rodded, rod.value.default)}) is not thinner than the bore (${say(bored, bore.value.default)}).`,
      remedy: 'Give a rod diameter below the bore, such as 36 mm in 50 mm.',
    },
  ];
}

/** Modules the piston travels on the sheet. */
export const TRAVEL = 6;
export const CYLINDER_BOUNDS = boxOf(-6, -2, 19, 5);
const DEFAULT_STROKE = 0.25;

export const travelOf = (look: Look): number => TRAVEL * Math.min(1, Math.max(0, look.stroke ?? DEFAULT_STROKE));

export const capPort = (): PortSpec =>
  port(
    'A',
    [-5, 3],
    'down',
    'working',
    leftOpen(
      'caution',
      'The cap side has no line; it counts as plugged, so the cylinder is locked by its own oil.',
      'Connect A, or plug it on purpose.',
    ),
  );

export const rodPort = (): PortSpec =>
  port(
    'B',
    [5, 3],
    'down',
    'working',
    leftOpen(
      'caution',
      'The rod side has no line; it counts as plugged, so the cylinder is locked by its own oil, at a raised pressure.',
      'Connect B, or plug it on purpose.',
    ),
  );

/** Barrel with its port stubs. */
export const barrel = (ports: readonly PortSpec[]): Primitive[] => [
  ...ports.map((spec) => stroke('symbol', [spec.at.x, 2], [spec.at.x, 3])),
  rectangle('symbol', boxOf(-6, -2, 12, 4), 'paper'),
];

/** Piston and rods, drawn retracted and shifted by the travel. `left` is the piston's face when retracted. */
export const piston = (travel: number, left: number, rods: readonly ('left' | 'right')[]): Primitive => ({
  type: 'group',
  role: 'piston',
  shift: { x: travel, y: 0 },
  children: [
    ...rods.map((side) =>
      rectangle(
        'symbol',
        side === 'right' ? boxOf(left + 1, -0.5, 7 - left - 1, 1) : boxOf(-7 - TRAVEL, -0.5, left + 7 + TRAVEL, 1),
        'paper',
      ),
    ),
    rectangle('symbol', boxOf(left, -2, 1, 4), 'ink'),
  ],
});

/** A rod that fills the bore with a little play, drawn retracted and shifted by the travel. */
export const plunger = (travel: number): Primitive => ({
  type: 'group',
  role: 'piston',
  shift: { x: travel, y: 0 },
  children: [rectangle('symbol', boxOf(-4, -1.25, 11, 2.5), 'paper')],
});
