import type { Circuit } from '../../circuit/model.ts';
import type { Figure } from '../../drawing/labels.ts';
import type { Look } from '../../parts/contract.ts';
import type { ActuatorVerdict, PumpVerdict, StateTable } from '../../worker/client.ts';
import { speedsAssumed } from '../state/assumed.ts';
import type { Assumed } from '../state/assumed.ts';
import { sayPump, sayForce, saySpeed } from '../state/figure-texts.ts';
import { figures } from '../state/figures.svelte.ts';
import { AT_STOP } from '../state/moment.ts';
import type { Moment } from '../state/moment.ts';
import { session } from '../state/session.svelte.ts';
import { view } from '../state/view.svelte.ts';

/** What the row says of one part. */
export interface PartState extends Look {
  readonly note?: string;
  readonly verdict?: ActuatorVerdict;
  readonly pump?: PumpVerdict;
  readonly freeInward?: boolean;
  /** Speed or pressure beside the verdict. */
  readonly figure?: Figure;
}

/** Positions, verdicts and strokes of the current row, by part. */
export function partStates(circuit: Circuit, assumed: Assumed): Map<string, PartState> {
  const states = new Map<string, PartState>();
  for (const input of session.inputs) {
    const position = session.positionOf(input.part);
    states.set(input.part, { position, note: input.positions[position] ?? '' });
  }
  const { table, row, conditions } = session;
  const known = new Set(circuit.parts.map((part) => part.id));
  // Drawn where the row puts them; of a two-stage valve that is the main spool, whatever its lever says.
  table?.data.dependents.forEach(({ part, positions }, i) => {
    if (!known.has(part)) return;
    const position = table.dependent(i, row);
    const name = positions[position] ?? '';
    const asked = states.get(part)?.note;
    const note = table.hunts(row)
      ? 'hunts'
      : asked === undefined || asked === name
        ? name
        : `${asked}, spool at ${name}`;
    states.set(part, { position, note });
  });
  const numbers = view.sheetFigures ? figures.current : undefined;
  const solved = numbers?.status === 'solved' ? numbers : undefined;
  const rests = table && solved ? speedsAssumed(assumed, table, solved) : [];
  table?.data.actuators.forEach(({ part, motion }, i) => {
    if (!known.has(part)) return;
    const verdict = table.actuator(i, row);
    const state = solved?.actuators[i];
    const speed = state && saySpeed(state.speed, motion, view.units);
    const force = state && sayForce(state.force, motion, view.units);
    const place = conditions.places?.[part];
    states.set(part, {
      verdict,
      note: verdict,
      freeInward: table.actuatorNotes(i, row).includes('free inward'),
      ...(speed !== undefined && {
        figure: {
          text: force === undefined ? speed : `${speed} · ${force}`,
          assumed: (rests[i] ?? true) || (force !== undefined && assumed.forces.has(part)),
        },
      }),
      ...(place && { stroke: place === 'in' ? 0 : 1 }),
    });
  });
  table?.data.pumps.forEach(({ part }, i) => {
    if (!known.has(part)) return;
    const pressure = sayPump(solved?.pumps[i]?.pressure, table.pump(i, row), view.units);
    const figure = pressure === undefined ? undefined : { text: pressure, assumed: assumed.anywhere };
    states.set(part, { pump: table.pump(i, row), note: table.pump(i, row), ...(figure && { figure }) });
  });
  if (session.moment) atMoment(states, session.moment, table, assumed);
  return states;
}

/** A moment of a plan has the last word on where things stand and how fast they go. */
function atMoment(
  states: Map<string, PartState>,
  { strokes, speeds, positions }: Moment,
  table: StateTable | undefined,
  assumed: Assumed,
): void {
  for (const [part, { index, name }] of positions) states.set(part, { position: index, note: name });
  table?.data.actuators.forEach(({ part, motion }) => {
    const before = states.get(part);
    if (!before) return;
    const { figure: _, ...state } = before;
    const speed = speeds.get(part) ?? 0;
    const verdict = verdictAt(before.verdict, speed, motion, strokes.get(part));
    const said = view.sheetFigures ? saySpeed(speed, motion, view.units) : undefined;
    const stroke = strokes.get(part);
    states.set(part, {
      ...state,
      verdict,
      note: verdict,
      ...(stroke !== undefined && { stroke }),
      ...(said !== undefined && { figure: { text: said, assumed: assumed.anywhere } }),
    });
  });
}

const OUTWARD: readonly ActuatorVerdict[] = ['extends', 'moved out by load', 'moved out by spring'];
const INWARD: readonly ActuatorVerdict[] = ['retracts', 'moved in by load', 'moved in by spring'];
const TURNING: readonly ActuatorVerdict[] = ['turns A→B', 'turns B→A', 'driven A→B by load', 'driven B→A by load'];

/** The word of the row, as long as it agrees with the motion. */
function verdictAt(
  word: ActuatorVerdict | undefined,
  speed: number,
  motion: 'linear' | 'rotary',
  stroke: number | undefined,
): ActuatorVerdict {
  const moves = saySpeed(speed, motion, 'metric') !== undefined;
  if (motion === 'rotary') {
    if (!moves) return word && !TURNING.includes(word) ? word : 'held';
    const ways: readonly ActuatorVerdict[] =
      speed > 0 ? ['turns A→B', 'driven A→B by load'] : ['turns B→A', 'driven B→A by load'];
    return word && ways.includes(word) ? word : (ways[0] as ActuatorVerdict);
  }
  if (!moves) {
    const said = word && !OUTWARD.includes(word) && !INWARD.includes(word) ? word : undefined;
    return said ?? (stroke !== undefined && (stroke < AT_STOP || stroke > 1 - AT_STOP) ? 'at stop' : 'held');
  }
  const ways = speed > 0 ? OUTWARD : INWARD;
  return word && ways.includes(word) ? word : (ways[0] as ActuatorVerdict);
}
