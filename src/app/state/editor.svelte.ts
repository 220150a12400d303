import type { Circuit } from '../../circuit/model.ts';
import type { Edit } from '../../circuit/edit.ts';
import { begin, canRedo, canUndo, commit, endBurst, isSaved, markSaved, redo, undo } from '../../circuit/history.ts';
import type { History } from '../../circuit/history.ts';
import { withPlaces } from './places.ts';

/** What is picked on the sheet, by id. */
export interface Selection {
  readonly parts: readonly string[];
  readonly connections: readonly string[];
  readonly labels: readonly string[];
}

export const NOTHING: Selection = { parts: [], connections: [], labels: [] };

export interface OpenFile {
  readonly name: string | undefined;
  readonly handle?: FileSystemFileHandle | undefined;
}

export const EMPTY: Circuit = { name: 'untitled', parts: [], connections: [] };

/** The circuit under the pen: every change goes through `do`, and every change can be taken back. */
class Editor {
  #history = $state.raw<History>(begin(EMPTY));

  history = $derived(this.#history);
  circuit: Circuit = $derived(this.#history.present);
  canUndo = $derived(canUndo(this.#history));
  canRedo = $derived(canRedo(this.#history));

  #selection = $state.raw<Selection>(NOTHING);
  /** Never names what is no longer there. */
  selection: Selection = $derived(present(this.#selection, this.circuit));

  /** File name as last opened or saved; undefined = never saved. */
  fileName = $state<string | undefined>();
  /** Where `Save` writes; browsers without file access have none. */
  handle = $state.raw<FileSystemFileHandle | undefined>();
  /** Differs from what stands in the file. */
  dirty = $derived(!isSaved(this.#history));

  /** Apply an edit; edits with the same `burst`, one after another, are one undo. Throws `RefusedEdit`. */
  do(edit: Edit, burst?: string): void {
    this.#history = commit(this.#history, withPlaces(this.circuit, edit), burst);
  }

  /** The next edit starts an undo step of its own. */
  endBurst(): void {
    this.#history = endBurst(this.#history);
  }

  undo(): void {
    this.#history = undo(this.#history);
  }

  redo(): void {
    this.#history = redo(this.#history);
  }

  select(selection: Partial<Selection>): void {
    this.#selection = { ...NOTHING, ...selection };
  }

  isSelected(what: keyof Selection, id: string): boolean {
    return this.selection[what].includes(id);
  }

  /** Put another circuit under the pen, with its history if it has one. */
  load(history: History, file?: OpenFile): void {
    this.#history = history;
    this.#selection = NOTHING;
    this.fileName = file?.name;
    this.handle = file?.handle;
  }

  markSaved(file: OpenFile): void {
    this.#history = markSaved(this.#history);
    this.fileName = file.name;
    this.handle = file.handle;
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
