import { begin, loadHistory } from '../../circuit/history.ts';
import type { History } from '../../circuit/history.ts';
import { readCircuit, writeCircuit } from '../../circuit/file.ts';
import { editor } from '../state/editor.svelte.ts';
import { notices } from '../state/notices.svelte.ts';
import { forget, recall, remember } from '../state/remembered.ts';
import { session } from '../state/session.svelte.ts';
import { lastSeen, seenOnDisk } from './disk.ts';
import { EXAMPLES } from './examples.ts';
import { openText } from './open.ts';
import { download, save } from './save.ts';
import { claimSlot, leftSlots } from './slots.ts';
import { fetchStored, putStored } from './stored.ts';

/** Every change is kept at once, unless keeping takes so long that it would be felt; then at this share of the time. */
const SHARE = 0.05;
const QUICK_MS = 4;
const LONGEST_MS = 500;
/** Undo steps that are still kept when the browser has no room for all of them. */
const FEWER = [200, 20, 0] as const;
const NO_ROOM = 'The browser has no room to keep this circuit';

interface Kept {
  readonly format: 1;
  /** As in the file, so that what comes back is checked like a file. */
  readonly circuit: string;
  readonly past: History['past'];
  readonly future: History['future'];
  readonly saved?: number;
  readonly fileName?: string | undefined;
  readonly levers: Readonly<Record<string, number>>;
}

/** Where the file of a slot is, and when it was written last as far as is known. */
interface KeptHandle {
  readonly handle: FileSystemFileHandle;
  readonly modified: number | undefined;
}

/** What this window keeps; undefined until it has found its slot, and nothing is kept before. */
let slot: string | undefined;
/** Undo steps that there was room for at last; undefined = no room even for the circuit. */
let room: number | undefined = Infinity;
let timer: ReturnType<typeof setTimeout> | undefined;
let took = 0;

function snapshot(history: History, steps: number): Kept {
  const from = Math.max(0, history.past.length - steps);
  return {
    format: 1,
    circuit: writeCircuit(history.present),
    past: history.past.slice(from),
    future: history.future.slice(0, steps),
    ...(history.saved !== undefined && history.saved >= from && { saved: history.saved - from }),
    fileName: editor.fileName,
    levers: session.levers,
  };
}

/** The most undo steps that fit beside the circuit, for which `keep` says whether there was room. */
function kept(history: History, keep: (what: Kept) => boolean): number | undefined {
  return [Infinity, ...FEWER].find((steps) => keep(snapshot(history, steps)));
}

export function autosaveNow(): void {
  clearTimeout(timer);
  timer = undefined;
  const into = slot;
  if (into === undefined) return;
  const started = performance.now();
  const before = room;
  room = kept(editor.history, (what) => remember(into, what));
  took = performance.now() - started;
  if (room !== before) sayRoom();
}

function sayRoom(): void {
  for (const { id, title } of notices.list) if (title === NO_ROOM) notices.dismiss(id);
  if (room === undefined) {
    notices.say({
      level: 'error',
      title: NO_ROOM,
      text: 'It is still open and nothing is lost, but closing this page would lose what is not saved.',
      action: { text: 'Save it to a file…', run: () => void save() },
    });
  } else if (room !== Infinity && editor.history.past.length > room) {
    notices.say({
      level: 'note',
      title: 'The browser has no room for all undo steps',
      text: `The circuit is kept. After a reload, ${room === 0 ? 'no step' : `only the last ${room} steps`} can be undone.`,
    });
  }
}

export function autosaveSoon(): void {
  const wait = took < QUICK_MS ? 0 : Math.min(took / SHARE, LONGEST_MS);
  timer ??= setTimeout(autosaveNow, wait);
}

/** True when closing the window would lose work, because there was no room to keep it. */
export const wouldLose = (): boolean => room === undefined && editor.dirty;

export async function keepHandle(handle: FileSystemFileHandle | undefined): Promise<void> {
  if (slot === undefined) return;
  await putStored(`handle ${slot}`, handle && ({ handle, modified: lastSeen(handle) } satisfies KeptHandle));
}

/** What was open last time; at the very first start the worked example; in a further window an empty sheet. */
export async function restore(): Promise<'restored' | 'demo' | 'empty'> {
  const claimed = await claimSlot();
  const what = recall<Partial<Kept> | undefined>(claimed, undefined);
  const restored =
    what?.format === 1 && typeof what.circuit === 'string' ? await restoreFrom(claimed, what) : undefined;
  slot = claimed;
  await offerLeft(claimed);
  if (restored !== undefined) return restored ? 'restored' : 'empty';
  if (claimed !== 'open') return 'empty';
  const [demo] = EXAMPLES;
  return demo && openText(demo.text, { name: undefined }) ? 'demo' : 'empty';
}

async function restoreFrom(claimed: string, what: Partial<Kept>): Promise<boolean> {
  const read = readCircuit(what.circuit ?? '');
  if (!read.ok) {
    const text = what.circuit ?? '';
    notices.say({
      level: 'error',
      title: 'What was open last time could not be read back',
      text: 'Its text is still kept in this browser until you change something here.',
      problems: read.problems,
      action: { text: 'Save its text as a file', run: () => download('unread.spool.json', text, 'application/json') },
    });
    return false;
  }
  const stored = await fetchStored<KeptHandle>(`handle ${claimed}`);
  const handle = stored?.handle.name === what.fileName ? stored?.handle : undefined;
  if (handle && stored?.modified !== undefined) seenOnDisk(handle, stored.modified);
  editor.load(revived(read.value, what), { name: what.fileName, handle });
  session.levers = what.levers ?? {};
  if (editor.dirty) {
    notices.say({
      level: 'note',
      title: 'Here is what you had open',
      text: 'Kept by this browser, not yet saved to a file.',
    });
  }
  return true;
}

function revived(present: History['present'], what: Partial<Kept>): History {
  const { past, future, saved } = what;
  const steps = loadHistory(JSON.stringify({ past, present, future, saved }));
  if (steps.ok) return { ...steps.value, present };
  notices.say({ level: 'note', title: 'The undo steps of last time are lost', text: 'The circuit itself is whole.' });
  return begin(present, false);
}

/** Unsaved work of windows that were closed or have crashed while others were open; what is saved goes away. */
async function offerLeft(own: string): Promise<void> {
  for (const left of await leftSlots(own)) {
    const what = recall<Partial<Kept> | undefined>(left, undefined);
    const steps = what?.past?.length ?? 0;
    const read = readCircuit(what?.circuit ?? '');
    if (!read.ok) continue;
    const { name, parts } = read.value;
    if (what?.saved === steps || parts.length === 0) {
      forget(left);
      continue;
    }
    notices.say({
      level: 'note',
      stays: true,
      title: `“${name}” is still kept from a window that was closed`,
      text: 'It was not saved to a file.',
      action: {
        text: `Open “${name}”`,
        run: () => {
          if (openText(what?.circuit ?? '', { name: what?.fileName })) forget(left);
        },
      },
    });
  }
}
