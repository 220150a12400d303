import { sheetsOf } from '../../circuit/sheets.ts';
import { editor } from '../state/editor.svelte.ts';

/** Which sheet of the circuit is in view; no part of the circuit. */
class ShownSheet {
  #wanted = $state<string | undefined>();

  /** Its id: the one turned to for as long as the circuit has it, else the first. */
  now: string = $derived.by(() => {
    const sheets = sheetsOf(editor.circuit);
    return (sheets.find(({ id }) => id === this.#wanted) ?? sheets[0])?.id ?? '';
  });

  want(id: string | undefined): void {
    this.#wanted = id;
  }
}

export const shownSheet = new ShownSheet();
