import type { PartKind } from './contract.ts';
import {
  barrel,
  boreSetting,
  checkBoreAndRod,
  CYLINDER_BOUNDS,
  piston,
  plunger,
  readAreas,
  rodSetting,
  strokeSetting,
  travelOf,
} from './cylinder-body.ts';
import { checkLoad, CYLINDER_LOAD, readLoad } from './load.ts';
import { ratingSetting, readRating } from './ratings.ts';
import { choiceSetting, quantitySetting, readChoice, readSi } from './settings.ts';
import { leftOpen, port, spring } from './shapes.ts';

const BORE = boreSetting('50 mm');
const ROD = rodSetting('28 mm');
const STROKE = strokeSetting('100 mm');
const RETURN = choiceSetting(
  { id: 'return', title: 'Returned by', help: 'What brings the rod back in when A is let down.' },
  ['spring', 'load'],
  'spring',
);
const SPRING_FORCE = quantitySetting(
  { id: 'springForce', title: 'Spring force', help: 'Force of the return spring at mid stroke.' },
  'force',
  '0.5 kN',
  { min: '0 kN', max: '1000 kN' },
);
const FORM = choiceSetting(
  { id: 'form', title: 'Form', help: 'A plunger is a rod as thick as the bore, which only its load brings back.' },
  ['piston', 'plunger'],
  'piston',
);
const PORTS = [
  port(
    'A',
    [-5, 3],
    'down',
    'working',
    leftOpen(
      'caution',
      'The cylinder has no line; A counts as plugged, so it is locked by its own oil.',
      'Connect A, or plug it on purpose.',
    ),
  ),
];
const RATING = ratingSetting('250 bar');

export const singleActingCylinder: PartKind = {
  kind: 'single-acting-cylinder',
  title: 'Single-acting cylinder',
  group: 'Motion',
  help: 'Oil into A extends it; a spring or the load brings it back. The rod side breathes.',
  words: ['spring return cylinder', 'ram', 'one way', 'actuator'],
  prefix: 'CYL',
  settings: [FORM, BORE, ROD, STROKE, RETURN, SPRING_FORCE, ...CYLINDER_LOAD.all, RATING],
  readyMade: [
    { id: 'single-acting-cylinder', title: 'Single-acting cylinder, spring return', make: () => ({}) },
    {
      id: 'single-acting-cylinder-load',
      title: 'Single-acting cylinder, returned by load',
      words: ['lift', 'gravity', 'ram'],
      make: () => ({ settings: { return: 'load', load: '10 kN', loadSense: 'pushes in' } }),
    },
    {
      id: 'plunger-cylinder',
      title: 'Plunger cylinder, returned by load',
      words: ['ram', 'lift', 'press', 'jack'],
      make: () => ({ settings: { form: 'plunger', return: 'load', load: '10 kN', loadSense: 'pushes in' } }),
    },
  ],
  ports: () => PORTS,
  ratings: (part) => [readRating(part, RATING, ['A'])],
  elements: (part) => {
    const areas = readAreas(part, BORE, ROD);
    const sprung = readChoice(part, FORM) === 'piston' && readChoice(part, RETURN) === 'spring';
    return [
      {
        type: 'actuator',
        a: 'A',
        motion: 'linear',
        areaA: areas.piston,
        areaB: areas.annulus,
        stroke: readSi(part, STROKE),
        ...(sprung ? { spring: 'in' as const, springForce: readSi(part, SPRING_FORCE) } : {}),
        ...readLoad(part, CYLINDER_LOAD),
      },
    ];
  },
  draw: (part, look) => {
    const travel = travelOf(look);
    const face = -3 + travel;
    if (readChoice(part, FORM) === 'plunger') return [...barrel(PORTS), plunger(travel)];
    return [
      ...barrel(PORTS),
      // The spring is squeezed between the piston and the far end, so it is drawn anew for each stroke.
      ...(readChoice(part, RETURN) === 'spring' ? [spring('fine', face, 6, 0, 1.6, 5)] : []),
      piston(travel, -4, ['right']),
    ];
  },
  bounds: () => CYLINDER_BOUNDS,
  check: (part) => [
    ...(readChoice(part, FORM) === 'plunger' ? [] : checkBoreAndRod(part, BORE, ROD)),
    ...checkLoad(part, CYLINDER_LOAD),
  ],
};
