import type { Action } from 'svelte/action';
import { desk } from '../sheet/desk.svelte.ts';
import { middleOfView, takeUp } from '../sheet/hand.ts';

/** Pixels the pointer may tremble in a click. */
const TREMBLE = 5;

/**
 * A part of the tray: dragging it carries it to the sheet; a click takes it in hand, to be placed by the next
 * click on the sheet; Enter takes it to the middle of the sheet, to be moved by arrows and placed by Enter.
 */
export const pressed: Action<HTMLElement, string> = (node, readyId) => {
  let id = readyId;
  let start: { readonly x: number; readonly y: number } | undefined;
  let dragged = false;

  const down = (event: PointerEvent): void => {
    if (event.button !== 0) return;
    start = { x: event.clientX, y: event.clientY };
    dragged = false;
  };
  const move = (event: PointerEvent): void => {
    if (!start || dragged || Math.hypot(event.clientX - start.x, event.clientY - start.y) < TREMBLE) return;
    dragged = true;
    takeUp(id);
    desk.carrying = true;
    desk.trayOpen = false;
  };
  const up = (): void => {
    start = undefined;
  };
  const click = (event: MouseEvent): void => {
    if (dragged) return;
    // A click that no pointer made comes from the keyboard.
    takeUp(id, event.detail === 0 ? middleOfView() : undefined);
    desk.trayOpen = false;
    desk.host?.focus({ preventScroll: true });
  };
  node.addEventListener('pointerdown', down);
  window.addEventListener('pointermove', move);
  window.addEventListener('pointerup', up);
  node.addEventListener('click', click);
  return {
    update: (next) => {
      id = next;
    },
    destroy: () => {
      node.removeEventListener('pointerdown', down);
      window.removeEventListener('pointermove', move);
      window.removeEventListener('pointerup', up);
      node.removeEventListener('click', click);
    },
  };
};
