import type { PartKind } from './contract.ts';
import {
  barrel,
  boreSetting,
  checkBoreAndRod,
  piston,
  readAreas,
  rodSetting,
  strokeSetting,
  travelOf,
} from './cylinder-body.ts';
import { checkSpring, drawnSpring, readSpring, SPRING } from './cylinder-spring.ts';
import { checkLoad, CYLINDER_LOAD, readLoad } from './load.ts';
import { ratingSetting, readRating } from './ratings.ts';
import { readSi } from './settings.ts';
import { boxOf, leftOpen, port } from './shapes.ts';

const BORE = boreSetting('50 mm');
const ROD = rodSetting('28 mm');
const STROKE = strokeSetting('400 mm');
const OPEN = leftOpen(
  'caution',
  'One side of the piston has no line; it counts as plugged, so the cylinder is locked by its own oil.',
  'Connect both sides, or plug one on purpose.',
);
const PORTS = [port('A', [-5, 3], 'down', 'working', OPEN), port('B', [5, 3], 'down', 'working', OPEN)];
const RATING = ratingSetting('250 bar');

export const doubleRodCylinder: PartKind = {
  kind: 'double-rod-cylinder',
  title: 'Double-rod cylinder',
  group: 'Motion',
  help: 'Rod at both ends, equal areas: the same speed and force both ways. Oil into A moves it towards B.',
  words: ['through rod cylinder', 'double ended', 'equal area', 'table drive', 'actuator'],
  prefix: 'CYL',
  settings: [BORE, ROD, STROKE, ...CYLINDER_LOAD.all, ...SPRING.all, RATING],
  readyMade: [{ id: 'double-rod-cylinder', title: 'Double-rod cylinder', make: () => ({}) }],
  ports: () => PORTS,
  ratings: (part) => [readRating(part, RATING, ['A', 'B'])],
  elements: (part) => {
    const { annulus } = readAreas(part, BORE, ROD);
    return [
      {
        type: 'actuator',
        a: 'A',
        b: 'B',
        motion: 'linear',
        areaA: annulus,
        areaB: annulus,
        stroke: readSi(part, STROKE),
        ...readSpring(part),
        ...readLoad(part, CYLINDER_LOAD),
      },
    ];
  },
  draw: (part, look) => [
    ...barrel(PORTS),
    ...drawnSpring(part, travelOf(look) - 3.5),
    piston(travelOf(look), -3.5, ['left', 'right']),
  ],
  bounds: () => boxOf(-13, -2, 26, 5),
  check: (part) => [...checkBoreAndRod(part, BORE, ROD), ...checkLoad(part, CYLINDER_LOAD), ...checkSpring(part)],
};
