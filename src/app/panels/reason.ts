import type { Subject } from '../state/session.svelte.ts';
import type {
  ActuatorVerdict,
  Explanation,
  PumpVerdict,
  ReasonStep,
  StateTable,
  TrapReason,
} from '../../worker/client.ts';

/** What the Why panel says about its subject, whatever kind it is. */
export interface Reason {
  readonly title: string;
  readonly actuator?: ActuatorVerdict;
  readonly pump?: PumpVerdict;
  readonly part?: string;
  readonly freeInward: boolean;
  readonly notes: readonly string[];
  /** Why open paths leave it to pressures, and what could come of it. */
  readonly rests?: { readonly why: string; readonly candidates: readonly string[] };
  readonly steps: readonly ReasonStep[];
  readonly trapped: readonly { readonly kind: TrapReason; readonly text: string }[];
}

const BARE: ReadonlySet<string> = new Set([
  'extends',
  'retracts',
  'turns A→B',
  'turns B→A',
  'floats',
  'rests on pressure',
]);

/** `LIFT is held`, `CLAMP extends`, `FEED turns A→B`. */
export const sayVerdict = (label: string, verdict: string): string =>
  BARE.has(verdict) ? `${label} ${verdict}` : `${label} is ${verdict}`;

export function reasonOf(explanation: Explanation, subject: Subject): Reason | undefined {
  const { key } = subject;
  if (subject.of === 'actuator') {
    const found = explanation.actuators.find((each) => each.part === key);
    if (!found) return undefined;
    return {
      title: sayVerdict(found.label, found.verdict),
      actuator: found.verdict,
      part: found.part,
      freeInward: found.notes.includes('free inward'),
      notes: found.notes,
      ...(found.rests && { rests: found.rests }),
      steps: found.steps,
      trapped: [],
    };
  }
  if (subject.of === 'pump') {
    const found = explanation.pumps.find((each) => each.part === key);
    if (!found) return undefined;
    return {
      title: sayVerdict(found.label, found.verdict),
      pump: found.verdict,
      part: found.part,
      freeInward: false,
      notes: [],
      ...(found.rests && { rests: found.rests }),
      steps: found.steps,
      trapped: [],
    };
  }
  if (subject.of === 'dependent') {
    const found = explanation.dependents.find((each) => each.part === key);
    if (!found) return undefined;
    return {
      title: found.hunts ? `${found.label} hunts` : `${found.label} stands at ${found.name}`,
      part: found.part,
      freeInward: false,
      notes: [],
      steps: found.steps,
      trapped: [],
    };
  }
  const found = explanation.trapped.find((each) => each.name === key);
  if (!found) return undefined;
  return {
    title: `Pressure can stand in ${found.name}`,
    freeInward: false,
    notes: [],
    steps: found.steps,
    trapped: found.reasons,
  };
}

/** Lines at the subject in which pressure can stand in this row, by name. */
export function trappedAt(table: StateTable, row: number, subject: Subject): string[] {
  if (subject.of === 'line') return [subject.key];
  const start = `${subject.key}.`;
  return table.data.lines.flatMap((line, i) =>
    line.ports.some((port) => port.startsWith(start)) && table.trapped(i, row).some((reason) => reason !== 'heat')
      ? [line.name]
      : [],
  );
}
