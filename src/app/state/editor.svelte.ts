import type { Circuit } from '../../circuit/model.ts';
import type { Edit } from '../../circuit/edits.ts';
import { History } from '../../circuit/history.ts';

/** What is picked on the sheet, by id. */
export interface Selection {
  readonly parts: readonly string[];
  readonly connections: readonly string[];
  readonly labels: readonly string[];
}

export const NOTHING: Selection = { parts: [], connections: [], labels: [] };

const EMPTY: Circuit = { name: 'untitled', parts: [], connections: [] };

/** The circuit under the pen: every change goes through `do`, and every change can be taken back. */
class Editor {
  #history = $state.raw(new History(EMPTY));
  /** Rises with every change of the history, which keeps its own state. */
  #turn = $state(0);

  circuit: Circuit = $derived.by(() => {
    void this.#turn;
    return this.#history.circuit;
  });
  canUndo = $derived.by(() => {
    void this.#turn;
    return this.#history.canUndo;
  });
  canRedo = $derived.by(() => {
    void this.#turn;
    return this.#history.canRedo;
  });

  #selection = $state.raw<Selection>(NOTHING);
  /** Never names what is no longer there. */
  selection: Selection = $derived(present(this.#selection, this.circuit));

  /** File name as last opened or saved; undefined = never saved. */
  fileName = $state<string | undefined>();
  /** Where `Save` writes; browsers without file access have none. */
  handle = $state.raw<FileSystemFileHandle | undefined>();
  /** The circuit as it stands in the file. */
  #saved = $state.raw<Circuit>(EMPTY);
  dirty = $derived(this.circuit !== this.#saved);

  /** Apply an edit. Edits with the same `burst` in a row are one undo. */
  do(edit: Edit, burst?: string): void {
    this.#history.commit(edit, burst);
    this.#turn++;
  }

  undo(): void {
    this.#history.undo();
    this.#turn++;
  }

  redo(): void {
    this.#history.redo();
    this.#turn++;
  }

  select(selection: Partial<Selection>): void {
    this.#selection = { ...NOTHING, ...selection };
  }

  isSelected(what: keyof Selection, id: string): boolean {
    return this.selection[what].includes(id);
  }

  /** Put another circuit under the pen; its undo starts afresh unless a history is given. */
  load(circuit: Circuit, file?: { readonly name?: string; readonly handle?: FileSystemFileHandle }): void {
    this.#history = new History(circuit);
    this.#turn++;
    this.#selection = NOTHING;
    this.fileName = file?.name;
    this.handle = file?.handle;
    this.#saved = circuit;
  }

  markSaved(name: string, handle?: FileSystemFileHandle): void {
    this.fileName = name;
    this.handle = handle;
    this.#saved = this.circuit;
  }
}

function present(selection: Selection, circuit: Circuit): Selection {
  const keep = (ids: readonly string[], things: readonly { readonly id: string }[]): readonly string[] => {
    const known = new Set(things.map((thing) => thing.id));
    return ids.every((id) => known.has(id)) ? ids : ids.filter((id) => known.has(id));
  };
  const parts = keep(selection.parts, circuit.parts);
  const connections = keep(selection.connections, circuit.connections);
  const labels = keep(selection.labels, circuit.labels ?? []);
  const same = parts === selection.parts && connections === selection.connections && labels === selection.labels;
  return same ? selection : { parts, connections, labels };
}

export const editor = new Editor();
