import type { Point } from '../../base/points.ts';
import { editor } from '../state/editor.svelte.ts';
import type { Selection } from '../state/editor.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { view } from '../state/view.svelte.ts';
import { endAt, portEnd } from './connecting.ts';
import { desk } from './desk.svelte.ts';
import { Fingers } from './fingers.ts';
import {
  commitShift,
  finishLine,
  previewShift,
  putDown,
  putDownSeveral,
  setLever,
  startLine,
  writeAt,
} from './hand.ts';
import { boxOf, hitAt, inBand } from './hit.ts';
import type { Hit } from './hit.ts';
import { insertionOfDragged } from './inserting.ts';
import { dropStretch, previewStretch, takeStretch } from './line-actions.ts';
import { plane } from './plane.svelte.ts';
import { openMenuAt } from './sheet-menu.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { sheetsActions } from './sheets-actions.ts';
import { panBy, snap } from './viewport.ts';

/** A press of the button until it is let go. */
interface Press {
  readonly pointer: number;
  readonly client: Point;
  readonly at: Point;
  readonly hit: Hit | { readonly type: 'label'; readonly id: string };
  readonly adds: boolean;
  readonly pans: boolean;
  /** A finger: it trembles more, and what it taps waits until it is lifted. */
  readonly touch: boolean;
  /** Ctrl: a part is moved without its block. */
  readonly alone: boolean;
  /** It was selected before. */
  readonly was: boolean;
  moved: boolean;
  last: Point;
}

/** Pixels the pointer, or a finger, may tremble in a click. */
const TREMBLE = 4;
const FINGER_TREMBLE = 9;

/** How near counts as on a port or a line, in modules: larger far out, so that it stays some pixels. */
const reach = (): number => Math.min(1.4, Math.max(0.7, 9 / desk.viewport.scale));

/** Mouse, pen and fingers on the sheet. `toSheet` turns client pixels into modules. */
export class SheetPointer {
  #press: Press | undefined;
  readonly #fingers = new Fingers();
  readonly #toSheet: (client: Point) => Point;
  readonly #offset: (client: Point) => Point;

  constructor(toSheet: (client: Point) => Point, offset: (client: Point) => Point) {
    this.#toSheet = toSheet;
    this.#offset = offset;
  }

  down(event: PointerEvent, host: HTMLElement): void {
    const client = { x: event.clientX, y: event.clientY };
    const touch = event.pointerType === 'touch';
    if (touch) this.#fingers.down(event.pointerId, this.#offset(client));
    // What is in hand stays there while two fingers look for the place.
    if (this.#fingers.count > 1) return this.#giveUp(true);
    if (event.button === 2) return this.#giveUp(true);
    const at = this.#toSheet(client);
    const { gesture } = desk;
    const pans = event.button === 1 || desk.panning;
    if (!pans && !touch && gesture.type === 'connect') return this.#end(at, reach());
    if (!pans && this.#lever(event)) return;
    const label = labelAt(event);
    const hit = label !== undefined ? ({ type: 'label', id: label } as const) : frameOf(event, this.#hitAt(at, event));
    const adds = event.shiftKey;
    if (gesture.type === 'bend') desk.rest();
    // A finger on bare paper pans: a rubber band is seldom wanted there. It pans too while a line waits for its end.
    const onPaper = hit.type === 'paper' && gesture.type === 'none';
    const slides = pans || (touch && (onPaper || gesture.type === 'connect'));
    const was = hit.type === 'port' && editor.isSelected('parts', hit.port.part);
    this.#press = {
      pointer: event.pointerId,
      client,
      at,
      hit,
      adds,
      pans: slides,
      touch,
      alone: event.ctrlKey || event.metaKey,
      was,
      moved: false,
      last: client,
    };
    host.setPointerCapture(event.pointerId);
    if (touch) this.#fingers.pressLong(() => this.#press?.moved === false && this.menu(event));
    if (!slides && (gesture.type === 'none' || gesture.type === 'bend')) pick(hit, adds);
  }

  move(event: PointerEvent): void {
    const client = { x: event.clientX, y: event.clientY };
    if (this.#fingers.count > 1) {
      plane.flow();
      desk.viewport = this.#fingers.pinched(desk.viewport, event.pointerId, this.#offset(client));
      return;
    }
    if (event.pointerType === 'touch' && this.#fingers.count > 0)
      this.#fingers.down(event.pointerId, this.#offset(client));
    const at = this.#toSheet(client);
    const press = this.#press;
    if (press && press.pointer === event.pointerId) {
      const tremble = press.touch ? FINGER_TREMBLE : TREMBLE;
      press.moved ||= Math.hypot(client.x - press.client.x, client.y - press.client.y) >= tremble;
      if (press.pans) {
        if (!press.moved) return;
        desk.viewport = panBy(desk.viewport, client.x - press.last.x, client.y - press.last.y);
        press.last = client;
        return;
      }
      if (press.moved) this.#drag(press, at);
      return;
    }
    const { gesture } = desk;
    if (gesture.type === 'place' || gesture.type === 'place-several' || gesture.type === 'text')
      desk.gesture = { ...gesture, at: snap(at) };
    else this.#hover(at, event);
  }

  up(event: PointerEvent): void {
    this.#fingers.up(event.pointerId);
    this.#fingers.stop();
    const press = this.#press;
    if (!press || press.pointer !== event.pointerId) return;
    this.#press = undefined;
    const at = this.#toSheet({ x: event.clientX, y: event.clientY });
    const { gesture } = desk;
    if (press.pans && (press.moved || !press.touch)) return;
    if (press.pans && gesture.type === 'connect') return this.#end(at, reach() * 2);
    if (gesture.type === 'place') return putDown(snap(at), event.shiftKey);
    if (gesture.type === 'place-several') return putDownSeveral(snap(at), event.shiftKey);
    if (gesture.type === 'text') return writeAt(at);
    if (gesture.type === 'drag' || (gesture.type === 'bend' && gesture.held)) {
      const { x, y } = deltaOf(press.at, at);
      const burst = `drag ${press.pointer} ${event.timeStamp}`;
      if (gesture.type === 'bend') return dropStretch(gesture, x, y, burst);
      desk.rest();
      return commitShift(x, y, burst, { into: gesture.into, alone: press.alone });
    }
    if (gesture.type === 'band') return this.#band(gesture.from, gesture.to, gesture.adds);
    if (gesture.type === 'connect' && gesture.held) {
      if (gesture.over) return finishLine(gesture.over);
      desk.rest();
      return desk.refuse('The line ended on bare paper. End it at a port or on a line.');
    }
    if (press.moved) return;
    if (press.hit.type === 'reference') return sheetsActions.followReference(press.hit.id);
    if (press.hit.type === 'port' && !press.hit.port.joint && !press.adds) startLine(portEnd(press.hit.port), false);
    if (press.hit.type === 'paper' && !press.adds) {
      editor.select({});
      desk.cursor = undefined;
    }
  }

  cancel(): void {
    this.#fingers.clear();
    this.#giveUp();
  }

  leave(): void {
    if (this.#press) return;
    desk.hover = { type: 'paper' };
    const { gesture } = desk;
    if (gesture.type === 'place' || gesture.type === 'place-several' || gesture.type === 'text')
      desk.gesture = { ...gesture, at: undefined };
  }

  doubleClick(event: MouseEvent): void {
    const hit = this.#hitAt(this.#toSheet({ x: event.clientX, y: event.clientY }), event);
    if (hit.type === 'part') view.open('settings');
    if (hit.type === 'connection') desk.naming = { of: 'connection', id: hit.id };
    const label = labelAt(event);
    if (label !== undefined) desk.naming = { of: 'label', id: label };
    const block = blockAt(event);
    if (block !== undefined && hit.type === 'paper') desk.naming = { of: 'group', id: block };
  }

  /** A shifted valve reaches beyond its outline: there the drawing itself tells. */
  #hitAt(at: Point, event: MouseEvent): Hit {
    const hit = hitAt(drawing.map, at, reach());
    const id = hit.type === 'paper' && under(event)?.closest('[data-part]')?.getAttribute('data-part');
    return id ? { type: 'part', id } : hit;
  }

  /** The waiting line ends at what is there. */
  #end(at: Point, within: number): void {
    const hit = hitAt(drawing.map, at, within);
    const over = endAt(hit);
    if (over) finishLine(over);
    else if (hit.type === 'reference') sheetsActions.followReference(hit.id);
    else desk.refuse('There is no port or line here. Click one, or press Escape to give the line up.');
  }

  /** `keeps`: what is in hand stays there; only a drag under way is given up. */
  #giveUp(keeps = false): void {
    const { gesture } = desk;
    this.#fingers.stop();
    this.#press = undefined;
    drawing.preview = undefined;
    const held = (gesture.type === 'bend' || gesture.type === 'connect') && gesture.held;
    if (!keeps || held || gesture.type === 'drag' || gesture.type === 'band') desk.rest();
  }

  /** Right button, or a long press: the menu of what is there; what is selected already stays selected. */
  menu(event: MouseEvent): void {
    this.#giveUp(true);
    if (desk.gesture.type !== 'none') return;
    const label = labelAt(event);
    const hit = frameOf(event, this.#hitAt(this.#toSheet({ x: event.clientX, y: event.clientY }), event));
    const of: Press['hit'] =
      label !== undefined
        ? { type: 'label', id: label }
        : hit.type === 'port'
          ? { type: 'part', id: hit.port.part }
          : hit;
    if (of.type === 'paper') editor.select({});
    else pick(of, false);
    openMenuAt({ x: event.clientX, y: event.clientY });
  }

  /** A click on the position name moves the lever on; Alt-click on a box moves it there. */
  #lever(event: PointerEvent): boolean {
    const target = under(event);
    if (!target || desk.gesture.type !== 'none') return false;
    const named = target.closest('[data-lever]')?.getAttribute('data-lever');
    if (named) {
      setLever(named, session.positionOf(named) + 1);
      return true;
    }
    if (!event.altKey) return false;
    const part = target.closest('[data-part]')?.getAttribute('data-part');
    const box = target.closest('[data-role="box"]')?.getAttribute('data-index');
    if (!part || !session.inputs.some((input) => input.part === part)) return false;
    setLever(part, box === null || box === undefined ? session.positionOf(part) + 1 : Number(box));
    return true;
  }

  #drag(press: Press, at: Point): void {
    const { gesture } = desk;
    const { hit } = press;
    if (gesture.type === 'place' || gesture.type === 'place-several' || gesture.type === 'text') {
      desk.gesture = { ...gesture, at: snap(at) };
      return;
    }
    if (gesture.type === 'none') {
      // A junction is picked by a click and then dragged; before that, a drag from it draws a line.
      const joint = hit.type === 'port' && hit.port.joint && press.was;
      if (hit.type === 'port' && !joint) {
        // Else a second line from the same junction would drag it.
        if (hit.port.joint) editor.select({});
        startLine(portEnd(hit.port), true);
      } else if (hit.type === 'part' || hit.type === 'label' || joint)
        desk.gesture = { type: 'drag', ids: editor.selection.parts };
      else if (hit.type === 'connection' && !press.adds) takeStretch(hit.id, hit.segment, true);
      else if (hit.type === 'paper') desk.gesture = { type: 'band', from: press.at, to: at, adds: press.adds };
      else return;
    }
    const now = desk.gesture;
    if (now.type === 'drag') {
      const { x, y } = deltaOf(press.at, at);
      previewShift(x, y, press.alone);
      const { parts, labels } = editor.selection;
      const into = labels.length === 0 ? insertionOfDragged(parts, x, y) : undefined;
      if (into !== now.into) desk.gesture = { ...now, into };
    } else if (now.type === 'bend') {
      const { x, y } = deltaOf(press.at, at);
      previewStretch(now, x, y);
    } else if (now.type === 'band') desk.gesture = { ...now, to: at };
    else if (now.type === 'connect') this.#aim(at);
  }

  #aim(at: Point): void {
    const { gesture } = desk;
    if (gesture.type !== 'connect') return;
    const over = endAt(hitAt(drawing.map, at, reach() * 1.3));
    const self =
      over?.type === 'port' &&
      gesture.from.type === 'port' &&
      over.ref.part === gesture.from.ref.part &&
      over.ref.port === gesture.from.ref.port;
    desk.gesture = { ...gesture, to: at, over: self ? undefined : over };
  }

  #hover(at: Point, event: PointerEvent): void {
    if (desk.gesture.type === 'connect') return this.#aim(at);
    const hit = this.#hitAt(at, event);
    if (hitKey(hit) !== hitKey(desk.hover)) desk.hover = hit;
  }

  #band(from: Point, to: Point, adds: boolean): void {
    desk.rest();
    const inside = inBand(drawing.map, boxOf(from, to));
    const { parts, connections, labels } = editor.selection;
    editor.select(
      adds
        ? {
            parts: union(parts, inside.parts),
            connections: union(connections, inside.connections),
            labels: union(labels, inside.labels),
          }
        : inside,
    );
    const count = inside.parts.length + inside.connections.length;
    desk.say(
      count === 0
        ? 'Nothing lies wholly inside.'
        : `${inside.parts.length} parts and ${inside.connections.length} connections selected.`,
    );
  }
}

/** The frame of a block stands for its parts. */
function frameOf(event: MouseEvent, hit: Hit): Hit {
  const block = hit.type === 'paper' ? blockAt(event) : undefined;
  const all = editor.circuit.groups?.find(({ id }) => id === block)?.parts ?? [];
  const parts = all.filter((id) => drawing.boxes.has(id));
  const [first] = parts;
  if (first === undefined || desk.gesture.type !== 'none') return hit;
  editor.select({ parts });
  return { type: 'part', id: first };
}

/** What the pointer is on, also where the sheet is covered because it moves. */
function under(event: MouseEvent): Element | undefined {
  if (!(event.target instanceof Element)) return undefined;
  if (!event.target.matches('[data-cover]')) return event.target;
  return document.elementsFromPoint(event.clientX, event.clientY).find((each) => !each.matches('[data-cover]'));
}

function blockAt(event: MouseEvent): string | undefined {
  return under(event)?.closest('[data-block]')?.getAttribute('data-block') ?? undefined;
}

function labelAt(event: MouseEvent): string | undefined {
  return under(event)?.closest('[data-label]')?.getAttribute('data-label') ?? undefined;
}

const deltaOf = (from: Point, to: Point): Point => snap({ x: to.x - from.x, y: to.y - from.y });

const union = (a: readonly string[], b: readonly string[]): string[] => [...new Set([...a, ...b])];

function hitKey(hit: Hit): string {
  if (hit.type === 'port') return `port ${hit.port.part}.${hit.port.port}`;
  return hit.type === 'paper' ? 'paper' : `${hit.type} ${hit.id}`;
}

/** Select what is pressed: alone, or with Shift in or out of the selection. What is selected stays so, for a drag. */
function pick(hit: Press['hit'], adds: boolean): void {
  let list: keyof Selection;
  let id: string;
  if (hit.type === 'part') [list, id] = ['parts', hit.id];
  else if (hit.type === 'connection') [list, id] = ['connections', hit.id];
  else if (hit.type === 'label') [list, id] = ['labels', hit.id];
  else if (hit.type === 'reference') [list, id] = ['connections', drawing.references.get(hit.id)?.connection ?? ''];
  else if (hit.type === 'port' && hit.port.joint && !adds) [list, id] = ['parts', hit.port.part];
  else return;
  const was = editor.isSelected(list, id);
  if (hit.type === 'part' || hit.type === 'connection' || hit.type === 'label') desk.cursor = { type: hit.type, id };
  if (!adds && was) return;
  if (!adds) editor.select({ [list]: [id] });
  else {
    const now = editor.selection;
    editor.select({ ...now, [list]: was ? now[list].filter((each) => each !== id) : [...now[list], id] });
  }
}
