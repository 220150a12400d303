import { copyOut } from '../../circuit/build.ts';
import { readCircuit, writeCircuit } from '../../circuit/file.ts';
import type { Circuit } from '../../circuit/model.ts';
import { circuitBounds } from '../../drawing/geometry.ts';
import { centred } from '../../drawing/sub-circuits.ts';
import { recall, remember } from '../state/remembered.ts';

const KEY = 'ownCircuits';
const MOST = 60;

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

  rename(from: string, to: string): boolean {
    const name = to.trim().slice(0, 60);
    if (name === '' || this.#kept.some((each) => each.name === name)) return false;
    return this.#set(this.#kept.map((each) => (each.name === from ? { ...each, name } : each)));
  }

  remove(name: string): void {
    this.#set(this.#kept.filter((each) => each.name !== name));
  }

  #set(kept: readonly Kept[]): boolean {
    if (!remember(KEY, kept)) return false;
    this.#kept = kept;
    return true;
  }
}

export const own = new Own();
