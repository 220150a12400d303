import { begin } from '../../circuit/history.ts';
import type { History } from '../../circuit/history.ts';
import { isReadyMadeFile } from '../../circuit/ready-made-file.ts';
import { openCircuit } from '../../parts/open.ts';
import { editor, EMPTY } from '../state/editor.svelte.ts';
import type { OpenFile } from '../state/editor.svelte.ts';
import { notices } from '../state/notices.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { seenOnDisk } from './disk.ts';
import { askForFile } from './pick.ts';
import { takeReadyMade } from './ready-made.ts';

/** Larger than any circuit: what is bigger is not one, and reading it would stop the screen. */
const LARGEST = 8 * 1024 * 1024;

type Levers = Readonly<Record<string, number>>;

/** Puts a circuit under the pen and keeps a way back to the one that was there. */
function replace(history: History, file: OpenFile, levers: Levers, said: string): void {
  const before = {
    history: editor.history,
    file: { name: editor.fileName, handle: editor.handle },
    levers: session.levers,
  };
  const worthKeeping = editor.dirty && editor.circuit.parts.length > 0;
  editor.load(history, file);
  session.levers = levers;
  session.whyNot();
  session.conditions = { pumps: session.conditions.pumps };
  if (!worthKeeping) return;
  const name = before.history.present.name;
  notices.say({
    level: 'note',
    stays: true,
    title: said,
    text: `“${name}” was not saved to a file.`,
    action: {
      text: `Go back to “${name}”`,
      run: () => {
        editor.load(before.history, before.file);
        session.levers = before.levers;
      },
    },
  });
}

export function newCircuit(): void {
  replace(begin(EMPTY), { name: undefined }, {}, 'New empty sheet');
}

/** Reads a circuit; one that cannot be read is said where and why, and the open work stays as it is. */
export function openText(text: string, file: OpenFile): boolean {
  const read = openCircuit(text);
  const name = file.name ?? 'The file';
  if (!read.ok) {
    notices.say({
      level: 'error',
      title: `${name} was not opened`,
      text: 'The open circuit is untouched.',
      problems: read.problems,
    });
    return false;
  }
  replace(begin(read.value), file, {}, `${read.value.name} is open`);
  if (read.warnings.length > 0) {
    notices.say({ level: 'error', title: `${name} was opened with remarks`, problems: read.warnings });
  }
  return true;
}

export async function openBlob(blob: File, handle?: FileSystemFileHandle): Promise<boolean> {
  if (blob.size > LARGEST) {
    notices.say({
      level: 'error',
      title: `${blob.name} was not opened`,
      text: `It has ${Math.round(blob.size / 1048576)} MB; a circuit file has less than 8 MB. The open circuit is untouched.`,
    });
    return false;
  }
  try {
    const text = await blob.text();
    if (isReadyMadeFile(text)) return takeReadyMade(text, blob.name);
    if (handle) seenOnDisk(handle, blob.lastModified);
    return openText(text, { name: blob.name, handle });
  } catch {
    notices.say({
      level: 'error',
      title: `${blob.name} could not be read`,
      text: 'The system did not hand it over. Check that it is there and that you may read it. The open circuit is untouched.',
    });
    return false;
  }
}

export async function openFromDisk(): Promise<void> {
  const picked = await askForFile();
  if (picked) await openBlob(picked.blob, picked.handle);
}

/** A file dropped on the page, with its place on disk where the browser tells it, so that Save writes there. */
export async function openDropped(transfer: DataTransfer | null): Promise<void> {
  const blob = transfer?.files[0];
  if (!blob) return;
  const item = [...(transfer?.items ?? [])].find(({ kind }) => kind === 'file');
  const handle = await item?.getAsFileSystemHandle?.().catch(() => null);
  await openBlob(blob, handle instanceof FileSystemFileHandle ? handle : undefined);
}
