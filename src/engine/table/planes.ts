import { emptySet, equalSets } from '../../base/bits.ts';
import type { Plane } from './table-data.ts';

/** Planes over all states, made as soon as a block has a bit for them. */
export class PlaneSheet {
  readonly #planes: (Plane | undefined)[][];
  readonly #states: number;

  constructor(items: number, kinds: number, states: number) {
    this.#planes = Array.from({ length: items }, () => new Array<Plane | undefined>(kinds).fill(undefined));
    this.#states = states;
  }

  write(item: number, kind: number, at: number, words: Uint32Array): void {
    const row = this.#planes[item] as (Plane | undefined)[];
    let plane = row[kind];
    if (plane === undefined) {
      if (words.every((word) => word === 0)) return;
      plane = emptySet(this.#states);
      row[kind] = plane;
    }
    plane.set(words, at);
  }

  /** The same, on top of what is there. */
  add(item: number, kind: number, at: number, words: Uint32Array): void {
    const now = this.#planes[item]?.[kind];
    if (now === undefined) return this.write(item, kind, at, words);
    for (let w = 0; w < words.length; w++) now[at + w] = (now[at + w] as number) | (words[w] as number);
  }

  get(item: number, kind: number): Plane | undefined {
    return this.#planes[item]?.[kind];
  }

  put(item: number, kind: number, plane: Plane): void {
    (this.#planes[item] as (Plane | undefined)[])[kind] = plane;
  }

  /** The planes, equal ones sharing their memory by way of `pool`: tables repeat themselves a lot. */
  finish(pool: PlanePool): (Plane | undefined)[][] {
    return this.#planes.map((row) => row.map((plane) => plane && pool.share(plane)));
  }
}

export class PlanePool {
  readonly #known = new Map<number, Plane[]>();

  share(plane: Plane): Plane {
    let hash = 0x811c9dc5;
    for (let i = 0; i < plane.length; i++) hash = Math.imul(hash ^ (plane[i] as number), 0x01000193);
    const bucket = this.#known.get(hash);
    if (bucket === undefined) {
      this.#known.set(hash, [plane]);
      return plane;
    }
    const same = bucket.find((other) => equalSets(other, plane));
    if (same) return same;
    bucket.push(plane);
    return plane;
  }
}
