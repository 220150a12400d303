import type { Explanation, Finding, ReasonStep } from '../../worker/client.ts';

/** A step of the reason on show: draw a balloon with `number` at its parts and lines. */
export interface LitStep {
  readonly number: number;
  readonly lines: readonly number[];
  readonly parts: readonly string[];
  /** The step under the pointer or focus: lit more strongly. */
  readonly current: boolean;
}

/** Everything to be lit on the sheet: lines by index in the table, parts by id, and the numbered steps. */
export interface Lit {
  readonly lines: readonly number[];
  readonly parts: readonly string[];
  readonly steps: readonly LitStep[];
}

/** What a reason is asked for: an actuator, a pump or a valve that follows by part id, a line by its name. */
export interface Subject {
  readonly of: 'actuator' | 'pump' | 'dependent' | 'line';
  readonly key: string;
}

const DARK: Lit = { lines: [], parts: [], steps: [] };

/** The reason of the subject in this row; none while the explanation is of another row. */
export function stepsOf(
  explanation: Explanation | undefined,
  subject: Subject | undefined,
  row: number,
): readonly ReasonStep[] {
  if (!explanation || !subject || explanation.row !== row) return [];
  const { of, key } = subject;
  if (of === 'actuator') return explanation.actuators.find((each) => each.part === key)?.steps ?? [];
  if (of === 'pump') return explanation.pumps.find((each) => each.part === key)?.steps ?? [];
  if (of === 'dependent') return explanation.dependents.find((each) => each.part === key)?.steps ?? [];
  return explanation.trapped.find((line) => line.name === key)?.steps ?? [];
}

/** Parts and lines of the finding that is picked. */
export function foundAt(findings: readonly Finding[], index: number | undefined): Lit | undefined {
  const found = index === undefined ? undefined : findings[index];
  return found && { lines: found.lines, parts: found.parts, steps: [] };
}

/** All steps of a reason, and what the one in hand speaks of. */
export function litSteps(steps: readonly ReasonStep[], step: number | undefined): Lit {
  if (steps.length === 0) return DARK;
  const lit = steps.map((each, i): LitStep => ({
    number: i + 1,
    lines: each.lines,
    parts: each.parts,
    current: i === step,
  }));
  const now = step === undefined ? undefined : lit[step];
  return { lines: now?.lines ?? [], parts: now?.parts ?? [], steps: lit };
}
