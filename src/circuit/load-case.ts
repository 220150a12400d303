import type { Circuit } from './model.ts';

/** The circuit with the loads of one of its cases in place of its parts' own; itself if `id` is undefined. Throws if it has no such case. */
export function withLoadCase(circuit: Circuit, id: string | undefined): Circuit {
  if (id === undefined) return circuit;
  const found = circuit.loadCases?.find((entry) => entry.id === id);
  if (!found) throw new Error(`This circuit has no load case ${id}.`);
  return {
    ...circuit,
    parts: circuit.parts.map((part) => {
      const loads = Object.hasOwn(found.loads, part.id) ? found.loads[part.id] : undefined;
      return loads ? { ...part, settings: { ...part.settings, ...loads } } : part;
    }),
  };
}
