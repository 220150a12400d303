import type { Circuit } from '../../circuit/model.ts';
import { labelOf } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import type { InputSpec } from '../../parts/contract.ts';

/** One lever of the bench. */
export interface CircuitInput extends InputSpec {
  readonly part: string;
  readonly label: string;
  readonly code: string | undefined;
}

/** Commanded inputs in circuit order, so that the bench stands before the table is there. */
export function inputsOf(circuit: Circuit): CircuitInput[] {
  return circuit.parts.flatMap((part) => {
    const input = kindOf(part.kind)?.input?.(part);
    return input ? [{ ...input, part: part.id, label: labelOf(part), code: part.code }] : [];
  });
}
