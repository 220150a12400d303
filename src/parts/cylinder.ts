import type { PartKind } from './contract.ts';
import {
  barrel,
  boreSetting,
  capPort,
  checkBoreAndRod,
  CYLINDER_BOUNDS,
  piston,
  readAreas,
  rodPort,
  rodSetting,
  strokeSetting,
  travelOf,
} from './cylinder-body.ts';
import { checkSpring, drawnSpring, readSpring, SPRING } from './cylinder-spring.ts';
import { checkLoad, CYLINDER_LOAD, readLoad } from './load.ts';
import { ratingSetting, readRating } from './ratings.ts';
import { readSi } from './settings.ts';

const BORE = boreSetting('50 mm');
const ROD = rodSetting('36 mm');
const STROKE = strokeSetting('400 mm');
const PORTS = [capPort(), rodPort()];
const RATING = ratingSetting('250 bar');

export const cylinder: PartKind = {
  kind: 'cylinder',
  title: 'Cylinder',
  group: 'Motion',
  help: 'Double acting, rod at one end: oil into A extends it, oil into B retracts it.',
  words: ['double acting cylinder', 'differential cylinder', 'ram', 'actuator', 'jack'],
  prefix: 'CYL',
  settings: [BORE, ROD, STROKE, ...CYLINDER_LOAD.all, ...SPRING.all, RATING],
  readyMade: [
    { id: 'cylinder', title: 'Cylinder', make: () => ({}) },
    {
      id: 'cylinder-lifting',
      title: 'Cylinder lifting a load',
      words: ['vertical', 'hoist', 'gravity', 'weight'],
      make: () => ({ settings: { bore: '63 mm', rod: '45 mm', load: '20 kN', loadSense: 'pushes in' } }),
    },
  ],
  ports: () => PORTS,
  ratings: (part) => [readRating(part, RATING, ['A', 'B'])],
  elements: (part) => {
    const areas = readAreas(part, BORE, ROD);
    return [
      {
        type: 'actuator',
        a: 'A',
        b: 'B',
        motion: 'linear',
        areaA: areas.piston,
        areaB: areas.annulus,
        stroke: readSi(part, STROKE),
        ...readSpring(part),
        ...readLoad(part, CYLINDER_LOAD),
      },
    ];
  },
  draw: (part, look) => [
    ...barrel(PORTS),
    ...drawnSpring(part, travelOf(look) - 4),
    piston(travelOf(look), -4, ['right']),
  ],
  bounds: () => CYLINDER_BOUNDS,
  check: (part) => [...checkBoreAndRod(part, BORE, ROD), ...checkLoad(part, CYLINDER_LOAD), ...checkSpring(part)],
};
