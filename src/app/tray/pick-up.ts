import type { Action } from 'svelte/action';
import type { Point } from '../../base/points.ts';
import { desk } from '../sheet/desk.svelte.ts';
import { middleOfView, takeUp, takeUpSeveral } from '../sheet/hand.ts';
import { swapFor } from '../sheet/swapping.ts';
import { severalOf } from './several.ts';

/** Pixels the pointer, or a finger, may tremble in a click. */
const TREMBLE = 5;
const FINGER_TREMBLE = 12;

/**
 * A part of the tray: dragging it carries it to the sheet; a click takes it in hand, to be placed by the next
 * click on the sheet; Enter takes it to the middle of the sheet, to be moved by arrows and placed by Enter.
 */
export const pressed: Action<HTMLElement, string> = (node, readyId) => {
  let id = readyId;
  let start: { readonly x: number; readonly y: number } | undefined;
  let dragged = false;

  const take = (at?: Point): void => {
    const several = severalOf(id);
    if (several) takeUpSeveral(several.title, several.make(), at);
    else takeUp(id, at);
  };
  const down = (event: PointerEvent): void => {
    if (event.button !== 0) return;
    start = { x: event.clientX, y: event.clientY };
    dragged = false;
  };
  const move = (event: PointerEvent): void => {
    if (!start || dragged) return;
    const [dx, dy] = [Math.abs(event.clientX - start.x), Math.abs(event.clientY - start.y)];
    // A finger that goes up or down scrolls the list; across, towards the sheet, it carries the part.
    if (event.pointerType === 'touch' ? dx < FINGER_TREMBLE || dx < dy : Math.hypot(dx, dy) < TREMBLE) return;
    dragged = true;
    desk.swapping = undefined;
    take();
    desk.carrying = true;
    desk.trayOpen = false;
  };
  const up = (): void => {
    start = undefined;
  };
  const click = (event: MouseEvent): void => {
    if (dragged) return;
    const { swapping, target } = desk;
    desk.trayOpen = false;
    desk.swapping = undefined;
    desk.target = undefined;
    if (swapping !== undefined && !severalOf(id)) swapFor(swapping, id);
    // A click that no pointer made comes from the keyboard.
    else take(target ?? (event.detail === 0 ? middleOfView() : undefined));
    desk.host?.focus({ preventScroll: true });
  };
  node.addEventListener('pointerdown', down);
  window.addEventListener('pointermove', move);
  window.addEventListener('pointerup', up);
  window.addEventListener('pointercancel', up);
  node.addEventListener('click', click);
  return {
    update: (next) => {
      id = next;
    },
    destroy: () => {
      node.removeEventListener('pointerdown', down);
      window.removeEventListener('pointermove', move);
      window.removeEventListener('pointerup', up);
      window.removeEventListener('pointercancel', up);
      node.removeEventListener('click', click);
    },
  };
};
