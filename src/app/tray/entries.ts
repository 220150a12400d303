import { readyMadeOf, type CatalogueEntry } from '../../parts/catalogue.ts';
import { fileValveEntries, fileValveOf } from '../../parts/file-valves.ts';
import { editor } from '../state/editor.svelte.ts';

/** What an id of the tray stands for: a form of the catalogue, or a ready-made valve of the circuit under the pen. */
export function entryOf(formId: string): CatalogueEntry | undefined {
  if (fileValveOf(formId) === undefined) return readyMadeOf(formId);
  return fileValveEntries(editor.circuit).find(({ readyMade }) => readyMade.id === formId);
}
