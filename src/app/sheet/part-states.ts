import type { Circuit } from '../../circuit/model.ts';
import type { Look } from '../../parts/contract.ts';
import type { ActuatorVerdict, PumpVerdict } from '../../worker/client.ts';
import { session } from '../state/session.svelte.ts';

/** What the row says of one part. */
export interface PartState extends Look {
  readonly note?: string;
  readonly verdict?: ActuatorVerdict;
  readonly pump?: PumpVerdict;
  readonly freeInward?: boolean;
}

/** Positions, verdicts and strokes of the current row, by part. */
export function partStates(circuit: Circuit): Map<string, PartState> {
  const states = new Map<string, PartState>();
  for (const input of session.inputs) {
    const position = session.positionOf(input.part);
    states.set(input.part, { position, note: input.positions[position] ?? '' });
  }
  const { table, row, conditions } = session;
  const known = new Set(circuit.parts.map((part) => part.id));
  table?.data.actuators.forEach(({ part }, i) => {
    if (!known.has(part)) return;
    const verdict = table.actuator(i, row);
    const place = conditions.places?.[part];
    states.set(part, {
      verdict,
      note: verdict,
      freeInward: table.actuatorNotes(i, row).includes('free inward'),
      ...(place && { stroke: place === 'in' ? 0 : 1 }),
    });
  });
  table?.data.pumps.forEach(({ part }, i) => {
    if (known.has(part)) states.set(part, { pump: table.pump(i, row), note: table.pump(i, row) });
  });
  return states;
}
