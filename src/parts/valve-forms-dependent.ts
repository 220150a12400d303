import type { ValveData } from '../circuit/model.ts';
import type { ReadyMade } from './contract.ts';
import { CENTRES, PORTS_2, PORTS_3, PORTS_4, coil, position, valve, type Actuation } from './valve-forms.ts';

/** Ready-made valves that pressures or actuators move. */
const TWO_PILOTS: Actuation = {
  id: 'pilots',
  title: 'two pilots, spring centred',
  words: ['hydraulically operated', 'pilot pressure'],
  left: ['pilot', 'spring'],
  right: ['pilot', 'spring'],
  rest: 1,
};
const ONE_PILOT: Actuation = {
  id: 'pilot',
  title: 'one pilot, spring offset',
  words: ['hydraulically operated', 'pilot pressure'],
  left: ['pilot'],
  right: ['spring'],
  rest: 1,
};
const TWO_PILOTS_DETENT: Actuation = {
  id: 'pilots-detent',
  title: 'two pilots, detent',
  words: ['hydraulically operated', 'memory', 'impulse'],
  left: ['pilot'],
  right: ['pilot', 'detent'],
};
const ROLLER: Actuation = {
  id: 'roller',
  title: 'roller, spring offset',
  words: ['cam', 'trip dog', 'plunger', 'deceleration', 'limit valve', 'mechanical'],
  left: ['roller'],
  right: ['spring'],
  rest: 1,
};
const STAGED_COILS: Actuation = {
  id: 'coils',
  title: 'two coils',
  words: ['solenoid', 'electrohydraulic', 'solenoid controlled', 'main stage'],
  left: ['pilot', 'coil', 'spring'],
  right: ['pilot', 'coil', 'spring'],
  rest: 1,
  coils: [coil('a', 0), coil('b', 2)],
};
const STAGED_LEVER: Actuation = {
  id: 'lever',
  title: 'lever',
  words: ['manual', 'main stage'],
  left: ['pilot', 'lever', 'spring'],
  right: ['pilot', 'spring'],
  rest: 1,
};
const STAGED_COIL: Actuation = {
  id: 'coil',
  title: 'coil, spring offset',
  words: ['solenoid', 'electrohydraulic', 'main stage'],
  left: ['pilot', 'coil'],
  right: ['spring'],
  rest: 1,
  coils: [coil('a', 0)],
};
const STAGED_DETENT: Actuation = {
  id: 'two-coils',
  title: 'two coils, detent',
  words: ['solenoid', 'electrohydraulic', 'memory', 'main stage'],
  left: ['pilot', 'coil'],
  right: ['pilot', 'coil', 'detent'],
  coils: [coil('a', 0), coil('b', 1)],
};

const fourThree = (prefix: string, called: string, centre: string, by: Actuation): ReadyMade => {
  const found = CENTRES.find(({ id }) => id === centre);
  return valve(
    `${prefix}-4/3-${centre}-${by.id}`,
    `${called}, ${found?.title ?? ''}`,
    found?.words ?? [],
    by,
    PORTS_4,
    [position('a', 'P-A', 'B-T'), position('0', ...(found?.paths ?? [])), position('b', 'P-B', 'A-T')],
  );
};
const fourTwo = (prefix: string, called: string, by: Actuation): ReadyMade =>
  valve(`${prefix}-4/2-${by.id}`, called, ['directional valve', 'reversing'], by, PORTS_4, [
    position('a', 'P-A', 'B-T'),
    position(by.rest === undefined ? 'b' : '0', 'P-B', 'A-T'),
  ]);

/** With settings of its own and a name of its own. */
const having = (form: ReadyMade, id: string, title: string, settings: Readonly<Record<string, string>>): ReadyMade => ({
  ...form,
  id,
  title: `${form.title}, ${title}`,
  make: () => ({ ...form.make(), settings }),
});

export const PILOT_FORMS: readonly ReadyMade[] = [
  fourThree('pilot', 'Pilot-operated 4/3 valve', 'shut', TWO_PILOTS),
  fourThree('pilot', 'Pilot-operated 4/3 valve', 'float', TWO_PILOTS),
  fourThree('pilot', 'Pilot-operated 4/3 valve', 'bypass', TWO_PILOTS),
  fourTwo('pilot', 'Pilot-operated 4/2 valve', ONE_PILOT),
  fourTwo('pilot', 'Pilot-operated 4/2 valve', TWO_PILOTS_DETENT),
  valve('pilot-3/2', 'Pilot-operated 3/2 valve, A to T at rest', ['single acting'], ONE_PILOT, PORTS_3, [
    position('a', 'P-A'),
    position('0', 'A-T'),
  ]),
  valve('pilot-2/2-shut', 'Pilot-operated 2/2 valve, shut at rest', ['normally closed'], ONE_PILOT, PORTS_2, [
    position('a', 'P-A'),
    position('0'),
  ]),
  valve('pilot-2/2-open', 'Pilot-operated 2/2 valve, open at rest', ['normally open'], ONE_PILOT, PORTS_2, [
    position('a'),
    position('0', 'P-A'),
  ]),
];

const EXTERNAL = { pilotSupply: 'external', pilotDrain: 'external' };

export const TWO_STAGE_FORMS: readonly ReadyMade[] = [
  fourThree('two-stage', 'Two-stage 4/3 valve', 'shut', STAGED_COILS),
  fourThree('two-stage', 'Two-stage 4/3 valve', 'bypass', STAGED_COILS),
  fourThree('two-stage', 'Two-stage 4/3 valve', 'float', STAGED_COILS),
  having(
    fourThree('two-stage', 'Two-stage 4/3 valve', 'shut', STAGED_COILS),
    'two-stage-4/3-shut-external',
    'external pilot supply and drain',
    EXTERNAL,
  ),
  having(
    fourThree('two-stage', 'Two-stage 4/3 valve', 'bypass', STAGED_COILS),
    'two-stage-4/3-bypass-external',
    'external pilot supply and drain',
    EXTERNAL,
  ),
  fourThree('two-stage', 'Two-stage 4/3 valve', 'shut', STAGED_LEVER),
  fourTwo('two-stage', 'Two-stage 4/2 valve', STAGED_COIL),
  fourTwo('two-stage', 'Two-stage 4/2 valve', STAGED_DETENT),
];

export const ROLLER_FORMS: readonly ReadyMade[] = [
  valve('roller-3/2', 'Roller 3/2 valve, A to T at rest', ['single acting', 'signal'], ROLLER, PORTS_3, [
    position('a', 'P-A'),
    position('0', 'A-T'),
  ]),
  fourTwo('roller', 'Roller 4/2 valve', ROLLER),
  valve('roller-2/2-open', 'Roller 2/2 valve, open at rest', ['normally open'], ROLLER, PORTS_2, [
    position('a'),
    position('0', 'P-A'),
  ]),
  valve('roller-2/2-shut', 'Roller 2/2 valve, shut at rest', ['normally closed'], ROLLER, PORTS_2, [
    position('a', 'P-A'),
    position('0'),
  ]),
];

/** The valve data of a form, for a part that has none of its own. */
export const dataOf = (forms: readonly ReadyMade[]): ValveData => forms[0]?.make().valve as ValveData;
