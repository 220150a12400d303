import { copyOut } from '../../circuit/build.ts';
import { readCircuit, writeCircuit } from '../../circuit/file.ts';
import { names } from '../../circuit/ids.ts';
import { LIMITS } from '../../circuit/limits.ts';
import type { Circuit } from '../../circuit/model.ts';
import { circuitBounds } from '../../drawing/geometry.ts';
import { placeMissing } from '../../drawing/place.ts';
import { centred } from '../../drawing/sub-circuits.ts';
import { recall, remember } from '../state/remembered.ts';

const KEY = 'ownCircuits';
const MOST = LIMITS.readyMadeCircuits;

export interface OwnCircuit {
  readonly name: string;
  readonly fragment: Circuit;
}

/** As text of a circuit file, so that what comes back is checked like a file. */
interface Kept {
  readonly name: string;
  readonly text: string;
}

function read(kept: Kept): OwnCircuit[] {
  const found = typeof kept.text === 'string' ? readCircuit(kept.text) : undefined;
  return found?.ok ? [{ name: String(kept.name), fragment: found.value }] : [];
}

/** What became of circuits that were to be taken in. */
export interface Taken {
  /** Names that they have in the tray. */
  readonly names: readonly string[];
  /** Names of those that were there already, to the letter. */
  readonly known: readonly string[];
  readonly undo: () => void;
}

/** Selections that the user keeps in this browser, to be placed again. */
class Own {
  #kept = $state.raw<readonly Kept[]>(recall<Kept[]>(KEY, []).slice(0, MOST));
  circuits: readonly OwnCircuit[] = $derived(this.#kept.flatMap(read));

  /** Its name in the tray; undefined when the browser would not keep it. */
  keep(circuit: Circuit, parts: readonly string[], labels: readonly string[]): string | undefined {
    const taken = new Set(this.#kept.map(({ name }) => name));
    let number = 1;
    while (taken.has(`Selection ${number}`)) number++;
    const name = `Selection ${number}`;
    const fragment = { ...centred(copyOut(circuit, parts, labels), circuitBounds), name };
    return this.#set([{ name, text: writeCircuit(fragment) }, ...this.#kept].slice(0, MOST)) ? name : undefined;
  }

  /** Adds circuits, under other names where theirs are taken; undefined = there is no room for all of them. */
  take(circuits: readonly Circuit[]): Taken | undefined {
    const before = this.#kept;
    const free = names(before.map(({ name }) => name));
    const [known, fresh]: [string[], Kept[]] = [[], []];
    for (const circuit of circuits) {
      const { parts, labels = [] } = circuit;
      const plain = copyOut(
        circuit,
        parts.map(({ id }) => id),
        labels.map(({ id }) => id),
      );
      const text = writeCircuit({ ...centred(placeMissing(plain), circuitBounds), name: circuit.name });
      if (before.some((each) => each.name === circuit.name && each.text === text)) known.push(circuit.name);
      else fresh.push({ name: free.like(circuit.name), text });
    }
    if (before.length + fresh.length > MOST || !this.#set([...fresh, ...before])) return undefined;
    return { names: fresh.map(({ name }) => name), known, undo: () => void this.#set(before) };
  }

  rename(from: string, to: string): boolean {
    const name = to.trim().slice(0, 60);
    if (name === '' || this.#kept.some((each) => each.name === name)) return false;
    return this.#set(this.#kept.map((each) => (each.name === from ? { ...each, name } : each)));
  }

  /** Gives what puts it back where it was. */
  remove(name: string): () => void {
    const at = this.#kept.findIndex((each) => each.name === name);
    const gone = this.#kept[at];
    this.#set(this.#kept.filter((each) => each.name !== name));
    return () => void (gone && this.#set(this.#kept.toSpliced(at, 0, gone)));
  }

  #set(kept: readonly Kept[]): boolean {
    if (!remember(KEY, kept)) return false;
    this.#kept = kept;
    return true;
  }
}

export const own = new Own();
