import type { Circuit } from '../../circuit/model.ts';
import type { Figure } from '../../drawing/labels.ts';
import type { Look } from '../../parts/contract.ts';
import type { ActuatorVerdict, PumpVerdict } from '../../worker/client.ts';
import { speedsAssumed } from '../state/assumed.ts';
import type { Assumed } from '../state/assumed.ts';
import { sayPump, saySpeed } from '../state/figure-texts.ts';
import { figures } from '../state/figures.svelte.ts';
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
    const speed = solved && saySpeed(solved.actuators[i]?.speed ?? 0, motion, view.units);
    const place = conditions.places?.[part];
    states.set(part, {
      verdict,
      note: verdict,
      freeInward: table.actuatorNotes(i, row).includes('free inward'),
      ...(speed !== undefined && { figure: { text: speed, assumed: rests[i] ?? true } }),
      ...(place && { stroke: place === 'in' ? 0 : 1 }),
    });
  });
  table?.data.pumps.forEach(({ part }, i) => {
    if (!known.has(part)) return;
    const pressure = sayPump(solved?.pumps[i]?.pressure, table.pump(i, row), view.units);
    const figure = pressure === undefined ? undefined : { text: pressure, assumed: assumed.anywhere };
    states.set(part, { pump: table.pump(i, row), note: table.pump(i, row), ...(figure && { figure }) });
  });
  return states;
}
