import { begin } from '../../circuit/history.ts';
import type { History } from '../../circuit/history.ts';
import { readCircuit, writeCircuit } from '../../circuit/file.ts';
import { editor } from '../state/editor.svelte.ts';
import { notices } from '../state/notices.svelte.ts';
import { recall, remember } from '../state/remembered.ts';
import { session } from '../state/session.svelte.ts';
import { EXAMPLES } from './examples.ts';
import { openText } from './open.ts';

const KEY = 'open';
const DELAY_MS = 600;
/** Undo steps that are still kept when the browser has no room for all of them. */
const FEWER = [200, 20, 0] as const;

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

let full = false;
let timer: ReturnType<typeof setTimeout> | undefined;

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

export function autosaveNow(): void {
  clearTimeout(timer);
  timer = undefined;
  const { history } = editor;
  for (const steps of [Infinity, ...FEWER]) {
    if (!remember(KEY, snapshot(history, steps))) continue;
    full = false;
    return;
  }
  if (full) return;
  full = true;
  notices.say({
    level: 'error',
    title: 'The browser has no room to keep this circuit',
    text: 'It is still open and nothing is lost, but closing this page would lose what is not saved. Save it to a file.',
  });
}

export function autosaveSoon(): void {
  clearTimeout(timer);
  timer = setTimeout(autosaveNow, DELAY_MS);
}

/** What was open last time, or the worked example at the first start. */
export function restore(): 'restored' | 'demo' | 'empty' {
  const kept = recall<Partial<Kept> | undefined>(KEY, undefined);
  if (kept?.format === 1 && typeof kept.circuit === 'string') {
    const read = readCircuit(kept.circuit);
    if (read.ok) {
      editor.load(revived(read.value, kept), { name: kept.fileName });
      session.levers = kept.levers ?? {};
      if (editor.dirty) {
        notices.say({
          level: 'note',
          title: 'Here is what you had open',
          text: 'Kept by this browser, not yet saved to a file.',
        });
      }
      return 'restored';
    }
    notices.say({
      level: 'error',
      title: 'What was open last time could not be read back',
      text: 'Its text is still kept in this browser until you change something here.',
      problems: read.problems,
    });
    return 'empty';
  }
  const [demo] = EXAMPLES;
  return demo && openText(demo.text, { name: undefined }) ? 'demo' : 'empty';
}

function revived(present: History['present'], kept: Partial<Kept>): History {
  const { past, future, saved } = kept;
  if (!Array.isArray(past) || !Array.isArray(future)) return begin(present, false);
  return { past, present, future, ...(typeof saved === 'number' && { saved }) };
}
