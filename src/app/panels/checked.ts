import { applyEdit } from '../../circuit/edit.ts';
import type { Edit } from '../../circuit/edit.ts';
import type { Circuit } from '../../circuit/model.ts';
import { RefusedEdit } from '../../circuit/refused.ts';
import { writeCircuit } from '../../circuit/write.ts';
import { openCircuit } from '../../parts/open.ts';
import type { Problem } from '../../base/result.ts';
import { editor } from '../state/editor.svelte.ts';

/** Why a file of this circuit would be refused; empty = it opens again. */
function faults(circuit: Circuit): readonly Problem[] {
  const opened = openCircuit(writeCircuit(circuit));
  return opened.ok ? [] : opened.problems;
}

/** The first thing wrong after an edit that was not wrong before; undefined = nothing. */
export function newFault(circuit: Circuit, edit: Edit): Problem | undefined {
  const after = faults(applyEdit(circuit, edit));
  if (after.length === 0) return undefined;
  const before = new Set(faults(circuit).map(({ what }) => what));
  return after.find(({ what }) => !before.has(what));
}

/** Do an edit, unless a saved file could then not be opened again; throws `RefusedEdit` that says why. */
export function doChecked(edit: Edit, burst?: string): void {
  const fault = newFault(editor.circuit, edit);
  if (fault) throw new RefusedEdit(fault.where, fault.what, fault.remedy);
  editor.do(edit, burst);
}

/** The same, giving what is wrong in words, to be shown in place; undefined = done. */
export function tryChecked(edit: () => Edit, burst?: string): string | undefined {
  try {
    doChecked(edit(), burst);
    return undefined;
  } catch (error) {
    return sayRefused(error);
  }
}

/** Rethrows what is no refusal. */
export function sayRefused(error: unknown): string {
  if (!(error instanceof RefusedEdit)) throw error;
  return `${error.problem.what} ${error.problem.remedy}`;
}
