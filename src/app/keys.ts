import { maker } from './maker/maker.svelte.ts';
import { editor } from './state/editor.svelte.ts';
import { plans } from './state/plans.svelte.ts';
import { session } from './state/session.svelte.ts';
import { asking } from './table/asking.svelte.ts';
import { goToRow } from './table/go-to-row.svelte.ts';
import { stopWaiting } from './table/stop-waiting.ts';
import { view } from './state/view.svelte.ts';
import { PANEL_KEYS } from './panels/panel-keys.ts';
import { openFromDisk } from './files/open.ts';
import { save, saveAs } from './files/save.ts';

/** Keys that work wherever the focus is, unless something there has taken them. */
const TWO_DIGITS_MS = 900;

let typed = { digits: '', at: 0 };

const isTyping = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement &&
  target.closest('input:not([type=radio], [type=checkbox]), textarea, select, [contenteditable=true]') !== null;

function slotOf(number: number): HTMLElement | null {
  return document.querySelector<HTMLElement>(`[data-slot="${number}"] [aria-checked="true"]`);
}

/** `1` goes to lever 1; `1` `2` soon after one another to lever 12. A lone `0` lets the lever in hand go. */
function digit(key: string, now: number): void {
  const soon = now - typed.at < TWO_DIGITS_MS && typed.digits.length === 1;
  const both = Number(typed.digits + key);
  const number = soon && both <= session.inputs.length ? both : Number(key);
  typed = { digits: number === both && soon ? '' : key, at: now };
  if (number === 0) {
    const slot = Number(document.activeElement?.closest<HTMLElement>('[data-slot]')?.dataset['slot'] ?? 0);
    const input = session.inputs[slot - 1];
    if (input?.rest === undefined) return;
    session.setPosition(input.part, input.rest);
    queueMicrotask(() => slotOf(slot)?.focus());
    return;
  }
  const target = slotOf(number);
  target?.focus();
  target?.closest('[data-slot]')?.scrollIntoView({ block: 'nearest', inline: 'nearest' });
}

/** Bands and panels in turn, as F6 goes. */
function nextRegion(back: boolean): void {
  const regions = [...document.querySelectorAll<HTMLElement>('[data-region]')].filter(
    (each) => each.offsetParent !== null || each.dataset['region'] === 'panel',
  );
  const at = regions.findIndex((region) => region.contains(document.activeElement));
  const next = regions.at((at + (back ? -1 : 1) + (at < 0 && back ? 1 : 0)) % regions.length);
  const first = next?.querySelector<HTMLElement>(
    '[tabindex="0"], button:not(:disabled, [tabindex="-1"]), input, select',
  );
  (first ?? next)?.focus();
}

function command(event: KeyboardEvent): boolean {
  const key = event.key.toLowerCase();
  if (key === 's') void (event.shiftKey ? saveAs() : save());
  else if (key === 'o') void openFromDisk();
  else if (key === 'p') view.open('print');
  else if (key === 'g') goToRow.on = session.table !== undefined;
  else if (isTyping(event.target)) return false;
  else if (key === 'z') void (event.shiftKey ? editor.redo() : editor.undo());
  else if (key === 'y') editor.redo();
  else return false;
  return true;
}

function plain(event: KeyboardEvent): boolean {
  const { key } = event;
  const panel = PANEL_KEYS[key.toLowerCase()];
  if (/^\d$/.test(key)) digit(key, event.timeStamp);
  else if (key === 'E') maker.openForSelection();
  else if (panel) view.toggle(panel);
  else if (key === 'q' || key === 'Q') asking.on = true;
  else if (key === 'g') goToRow.on = session.table !== undefined;
  else if (key === '[') session.goToRow(session.row - 1);
  else if (key === ']') session.goToRow(session.row + 1);
  else if (key === 'j' || key === 'J') view.showLower(view.lower === 'plans' ? 'table' : 'plans');
  else if (key === ',' || key === ';') plans.showNext(key === ',' ? -1 : 1);
  else if (key === 'r' || key === 'R') session.letGo();
  else if (key === 'p' || key === 'P') session.setPumps(session.conditions.pumps === 'running' ? 'stopped' : 'running');
  else return false;
  return true;
}

export function globalKey(event: KeyboardEvent): void {
  if (event.defaultPrevented || event.isComposing) return;
  if (event.key === 'F6') nextRegion(event.shiftKey);
  else if (event.key === 'Escape') {
    if (!stopWaiting()) return;
  } else if (event.altKey) return;
  else if (event.ctrlKey || event.metaKey) {
    if (!command(event)) return;
  } else if (isTyping(event.target) || !plain(event)) return;
  event.preventDefault();
}
