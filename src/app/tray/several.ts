import type { Circuit } from '../../circuit/model.ts';
import { SUB_CIRCUITS } from '../../drawing/sub-circuits.ts';
import type { SubCircuit } from '../../drawing/sub-circuits.ts';
import { own } from './own.svelte.ts';

/** Titles of the tray's sections of circuits: those that come with the program, and the user's. */
export const SEVERAL = 'Ready-made circuits';
export const OWN = 'Your own';

const OWN_PREFIX = 'own ';
export const ownId = (name: string): string => OWN_PREFIX + name;

/** What the tray's id stands for, if it stands for several parts with their lines. */
export function severalOf(id: string): { readonly title: string; readonly make: () => Circuit } | undefined {
  const made = SUB_CIRCUITS.find((each) => each.id === id);
  if (made) return made;
  const kept = id.startsWith(OWN_PREFIX) ? own.circuits.find(({ name }) => ownId(name) === id) : undefined;
  return kept && { title: kept.name, make: () => kept.fragment };
}

export function searchSeveral(query: string): readonly SubCircuit[] {
  const wanted = query
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== '');
  return SUB_CIRCUITS.filter(({ title, help, words }) => {
    const text = [title, help, ...words].join(' ').toLowerCase();
    return wanted.every((word) => text.includes(word));
  });
}
