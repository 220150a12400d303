import type { Circuit } from '../../circuit/model.ts';
import { portOf } from '../../drawing/geometry.ts';
import type { Routes } from '../../drawing/geometry.ts';
import { laying } from '../../drawing/laying.ts';
import type { Laying } from '../../drawing/laying.ts';
import { quickRoute } from '../../drawing/quick-route.ts';
import { routingSheet } from '../../drawing/routing.ts';

/** Searches that are made at once whatever they take: up to here a drawing is never shown unfinished. */
const AT_ONCE = 40;
/** ms of one frame that searches may take beyond these. */
const SHARE_MS = 8;

/** How work goes on after this frame, and who is told when it is done. */
export interface Later {
  readonly run: (step: () => void) => void;
  readonly now: () => number;
  readonly done: () => void;
}

interface Work {
  readonly circuit: Circuit;
  readonly steps: Generator<void, Laying>;
}

/**
 * Routes from one form of the circuit to the next: always those of laying all of it, so that the sheet shows what the
 * file shows when it is opened or printed, but only what an edit may have changed is searched. A long search goes on
 * over the next frames, and meanwhile the lines not laid yet take simple shapes. A route that came out the same stays
 * the same object, and so does the whole where all did.
 */
export class SheetRoutes {
  #laid: Laying | undefined;
  #work: Work | undefined;
  #shown: Routes = new Map();
  readonly #later: Later | undefined;

  /** Without `later` all is done at once. */
  constructor(later?: Later) {
    this.#later = later;
  }

  of(circuit: Circuit): Routes {
    if (circuit === this.#laid?.circuit || circuit === this.#work?.circuit) return this.#shown;
    const work: Work = { circuit, steps: laying(circuit, this.#laid) };
    this.#work = work;
    if (!this.#advance(work, AT_ONCE)) {
      this.#shown = sketched(circuit, this.#laid?.routes ?? new Map());
      this.#later?.run(() => this.#goOn(work));
    }
    return this.#shown;
  }

  /** With all searches finished. */
  finished(circuit: Circuit): Routes {
    this.of(circuit);
    if (this.#work) {
      this.#advance(this.#work, Infinity);
      // Who was shown it unfinished is told, but not in the middle of this.
      this.#later?.run(this.#later.done);
    }
    return this.#shown;
  }

  #goOn(work: Work): void {
    if (work !== this.#work) return;
    if (this.#advance(work, 1)) this.#later?.done();
    else this.#later?.run(() => this.#goOn(work));
  }

  /** True once all is laid. */
  #advance({ steps }: Work, atOnce: number): boolean {
    const now = this.#later?.now ?? ((): number => 0);
    const end = now() + SHARE_MS;
    for (let count = 1; ; count++) {
      const { done, value } = steps.next();
      if (done) {
        this.#laid = value;
        this.#work = undefined;
        this.#shown = same(this.#shown, value.routes) ? this.#shown : value.routes;
        return true;
      }
      if (count >= atOnce && now() > end) return false;
    }
  }
}

const same = (a: Routes, b: Routes): boolean =>
  a.size === b.size && [...b].every(([id, points]) => a.get(id) === points);

/** As they were where they still fit, else by simple shapes. */
function sketched(circuit: Circuit, before: Routes): Routes {
  const sheet = routingSheet(circuit);
  return new Map(
    circuit.connections.map((connection) => {
      const route = before.get(connection.id);
      const [from, to] = [connection.from, connection.to].map((ref) => {
        const part = sheet.parts.get(ref.part);
        return part && portOf(part, ref).at;
      });
      const [first, last] = [route?.[0], route?.at(-1)];
      const fits =
        first && last && from && to && first.x === from.x && first.y === from.y && last.x === to.x && last.y === to.y;
      return [connection.id, route && fits ? route : quickRoute(sheet, connection)];
    }),
  );
}
