import type { Box } from '../base/points.ts';
import type { Circuit } from '../circuit/model.ts';
import type { SceneBlock } from './blocks.ts';
import { sceneBlocks } from './blocks.ts';
import type { Routes } from './geometry.ts';
import { hopsOf } from './hops.ts';
import type { Hops } from './hops.ts';
import type { Dot } from './joints.ts';
import { crossings, junctionDots } from './joints.ts';
import { labelBox, labelSpots } from './labels.ts';
import type { LabelSpots, SceneLabel } from './labels.ts';
import { lineLabels } from './line-labels.ts';
import type { LineNumbers } from './lines.ts';
import { lineNumbers } from './lines.ts';
import type { Piece } from './pieces.ts';
import { freshPieces } from './pieces.ts';

/** What a scene needs that does not depend on the state: computed once for a circuit and its routes. */
export interface Stage {
  readonly numbers: LineNumbers;
  readonly pieces: ReadonlyMap<string, readonly Piece[]>;
  readonly dots: readonly Dot[];
  readonly spots: LabelSpots;
  readonly rooms: readonly Box[];
  readonly lineLabels: readonly SceneLabel[];
  readonly blocks: readonly SceneBlock[];
  /** Asked for seldom. */
  readonly hops: () => Hops;
  /** `part.port` → connections at it. */
  readonly atPort: ReadonlyMap<string, readonly string[]>;
}

const stages = new WeakMap<Circuit, { readonly routes: Routes; readonly noted: boolean; readonly stage: Stage }>();

/** `noted`: with room beside names for what a state says. */
export function stageOf(circuit: Circuit, routes: Routes, noted: boolean): Stage {
  const known = stages.get(circuit);
  if (known && known.routes === routes && known.noted === noted) return known.stage;
  const numbers = lineNumbers(circuit);
  const spots = labelSpots(circuit, routes, noted);
  const rooms = [...spots.values()].map(({ box }) => box);
  const named = lineLabels(circuit, routes, rooms);
  const stage: Stage = {
    numbers,
    pieces: freshPieces(circuit, routes, numbers),
    dots: junctionDots(circuit, routes),
    spots,
    rooms: [...rooms, ...named.map(labelBox)],
    lineLabels: named,
    blocks: sceneBlocks(circuit),
    hops: hopsLater(circuit, routes),
    atPort: connectionsAt(circuit),
  };
  stages.set(circuit, { routes, noted, stage });
  return stage;
}

function hopsLater(circuit: Circuit, routes: Routes): () => Hops {
  let hops: Hops | undefined;
  return () => (hops ??= hopsOf(crossings(circuit, routes)));
}

/** `part.port` → connections at it. */
export function connectionsAt(circuit: Circuit): Map<string, string[]> {
  const out = new Map<string, string[]>();
  for (const { id, from, to } of circuit.connections) {
    for (const { part, port } of [from, to]) {
      const list = out.get(`${part}.${port}`);
      if (list) list.push(id);
      else out.set(`${part}.${port}`, [id]);
    }
  }
  return out;
}
