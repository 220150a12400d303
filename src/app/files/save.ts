import { writeCircuit } from '../../circuit/file.ts';
import { editor } from '../state/editor.svelte.ts';
import { notices } from '../state/notices.svelte.ts';
import { look, writtenByOthers } from './disk.ts';
import { FILE_TYPES, pick } from './pick.ts';

const ENDING = '.spool.json';

/** `Gate and clamp rig` → `gate-and-clamp-rig`. */
export function fileStem(name: string): string {
  const stem = name
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-+|-+$/g, '');
  return stem === '' ? 'circuit' : stem;
}

/** Hand a file to the browser's downloads. */
export function download(name: string, content: string | Blob, type: string): void {
  const url = URL.createObjectURL(content instanceof Blob ? content : new Blob([content], { type }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 60_000);
}

/** False = the system refused it, which is then said. */
export async function writeTo(handle: FileSystemFileHandle, text: string): Promise<boolean> {
  try {
    const stream = await handle.createWritable();
    await stream.write(text);
    await stream.close();
    await look(handle);
    return true;
  } catch {
    notices.say({
      level: 'error',
      title: `${handle.name} could not be written`,
      text: 'The system refused it: the place may be full or write-protected. Use Save as… to put it elsewhere; nothing is lost here.',
    });
    return false;
  }
}

export async function save(): Promise<void> {
  const { handle } = editor;
  if (!handle) return saveAs();
  if (!(await writtenByOthers(handle))) return saveOver(handle);
  notices.say({
    level: 'error',
    title: `${handle.name} was not saved: it has changed on disk`,
    text: 'Another window or program has written it since it was opened or saved here. Save as… keeps both; nothing is lost here.',
    action: { text: 'Write over it', run: () => void saveOver(handle) },
  });
}

async function saveOver(handle: FileSystemFileHandle): Promise<void> {
  if (await writeTo(handle, writeCircuit(editor.circuit))) editor.markSaved({ name: handle.name, handle });
}

export async function saveAs(): Promise<void> {
  const text = writeCircuit(editor.circuit);
  const suggestedName = editor.fileName ?? fileStem(editor.circuit.name) + ENDING;
  if (window.showSaveFilePicker) {
    const handle = await pick(() => window.showSaveFilePicker?.({ suggestedName, types: FILE_TYPES }));
    if (handle && (await writeTo(handle, text))) editor.markSaved({ name: handle.name, handle });
    return;
  }
  download(suggestedName, text, 'application/json');
  editor.markSaved({ name: suggestedName });
}
