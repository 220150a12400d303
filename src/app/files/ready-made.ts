import { readReadyMade, writeReadyMade } from '../../circuit/ready-made-file.ts';
import { LIMITS } from '../../circuit/limits.ts';
import { openCircuit } from '../../parts/open.ts';
import { notices } from '../state/notices.svelte.ts';
import { counted } from '../sheet/counted.ts';
import { own } from '../tray/own.svelte.ts';
import { askForFile, FILE_TYPES, pick } from './pick.ts';
import { download, writeTo } from './save.ts';

const NAME = 'ready-made-circuits.json';
/** Names said before the rest is counted. */
const MOST_SAID = 12;

const said = (names: readonly string[]): string =>
  `${names.slice(0, MOST_SAID).join(', ')}${names.length > MOST_SAID ? ` and ${names.length - MOST_SAID} more` : ''}`;

/** Writes all of the person's own ready-made circuits into one file. */
export async function saveReadyMade(): Promise<void> {
  const circuits = own.circuits.map(({ name, fragment }) => ({ ...fragment, name }));
  if (circuits.length === 0) {
    notices.say({
      level: 'error',
      title: 'There is no ready-made circuit of your own yet',
      text: 'Select parts on the sheet and press Shift S: they are then kept in the tray, under Your own.',
    });
    return;
  }
  const text = writeReadyMade(circuits);
  let name = NAME;
  if (window.showSaveFilePicker) {
    const handle = await pick(() => window.showSaveFilePicker?.({ suggestedName: NAME, types: FILE_TYPES }));
    if (!handle || !(await writeTo(handle, text))) return;
    name = handle.name;
  } else download(NAME, text, 'application/json');
  notices.say({
    level: 'note',
    title: `${counted(circuits.length, 'ready-made circuit')} saved to ${name}`,
    text: said(circuits.map((circuit) => circuit.name)),
  });
}

export async function loadReadyMade(): Promise<void> {
  const picked = await askForFile();
  if (picked) takeReadyMade(await picked.blob.text(), picked.blob.name);
}

/** Takes the circuits of a file into the tray and lists them; one that cannot be read is said where and why. */
export function takeReadyMade(text: string, name: string): boolean {
  const read = readReadyMade(text, openCircuit);
  const refused = `Nothing was taken from ${name}`;
  if (!read.ok) {
    notices.say({ level: 'error', title: refused, text: 'The tray is as it was.', problems: read.problems });
    return false;
  }
  const spread = read.value.find(({ sheets = [] }) => sheets.length > 1);
  if (spread) {
    notices.say({
      level: 'error',
      title: refused,
      text: `“${spread.name}” is drawn on several sheets; a ready-made circuit stands on one. The tray is as it was.`,
    });
    return false;
  }
  const taken = own.take(read.value);
  if (!taken) {
    notices.say({
      level: 'error',
      title: refused,
      text: `There is no room: the tray keeps up to ${LIMITS.readyMadeCircuits} circuits of your own, as far as the browser has room. Remove some of them first.`,
    });
    return false;
  }
  const { names, known, undo } = taken;
  notices.say({
    level: 'note',
    stays: true,
    title: `${counted(names.length, 'ready-made circuit')} taken into the tray`,
    text: [
      ...(names.length > 0 ? [`Under Your own: ${said(names)}.`] : []),
      ...(known.length > 0 ? [`There already: ${said(known)}.`] : []),
    ].join(' '),
    ...(names.length > 0 && { action: { text: 'Take them out again', run: undo } }),
  });
  return true;
}
