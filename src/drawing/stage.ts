import type { Box, Point } from '../base/points.ts';
import type { Circuit } from '../circuit/model.ts';
import type { SceneBlock } from './blocks.ts';
import { sceneBlocks } from './blocks.ts';
import type { Routes } from './geometry.ts';
import { hopsOf } from './hops.ts';
import type { Hops } from './hops.ts';
import type { Dot } from './joints.ts';
import { crossings, junctionDots } from './joints.ts';
import { labelBox, labelSpots } from './labels.ts';
import type { LabelSpots, SceneLabel, Spot } from './labels.ts';
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

/** A circuit at rest, with its routes. */
export interface Before {
  readonly circuit: Circuit;
  readonly routes: Routes;
}

const stages = new WeakMap<Circuit, { readonly routes: Routes; readonly noted: boolean; readonly stage: Stage }>();

/** `from`: where parts come from that are on their way; then all that did not move is kept as it is. */
export function stageOf(circuit: Circuit, routes: Routes, noted: boolean, from?: Before): Stage {
  const known = stages.get(circuit);
  if (known && known.routes === routes && known.noted === noted) return known.stage;
  if (from) return movedStage(stageOf(from.circuit, from.routes, noted), from, circuit, routes);
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

function connectionsAt(circuit: Circuit): Map<string, string[]> {
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

/** Lines whose route changed are cut up anew, names go along with their parts; all else stays. */
function movedStage(old: Stage, from: Before, circuit: Circuit, routes: Routes): Stage {
  const numbers = lineNumbers(circuit);
  const changed = new Set<number>();
  for (const { id } of circuit.connections)
    if (routes.get(id) !== from.routes.get(id)) changed.add(numbers.get(id) ?? -1);
  const numbered = numbers === old.numbers || sameNumbers(numbers, old.numbers);
  const only = numbered ? changed : undefined;
  const stood = new Map(from.circuit.parts.map((part) => [part.id, part]));
  const spots = new Map(old.spots);
  const moving = new Set<string>();
  for (const part of circuit.parts) {
    const [was, spot] = [stood.get(part.id), old.spots.get(part.id)];
    if (was === part || !spot || !was) continue;
    moving.add(part.id);
    const by = { x: (part.at?.x ?? 0) - (was.at?.x ?? 0), y: (part.at?.y ?? 0) - (was.at?.y ?? 0) };
    spots.set(part.id, shifted(spot, by));
  }
  const named = changed.size > 0 ? lineLabels(circuit, routes, []) : old.lineLabels;
  return {
    ...old,
    numbers,
    pieces: only
      ? new Map([...old.pieces, ...freshPieces(circuit, routes, numbers, only)])
      : freshPieces(circuit, routes, numbers),
    dots: only
      ? [...old.dots.filter(({ line }) => !only.has(line)), ...junctionDots(circuit, routes, only)]
      : junctionDots(circuit, routes),
    spots,
    lineLabels: named,
    blocks: moving.size > 0 && (circuit.groups?.length ?? 0) > 0 ? sceneBlocks(circuit) : old.blocks,
    hops: hopsLater(circuit, routes),
  };
}

function sameNumbers(a: LineNumbers, b: LineNumbers): boolean {
  if (a.size !== b.size) return false;
  for (const [id, line] of a) if (b.get(id) !== line) return false;
  return true;
}

const shifted = ({ at, align, box }: Spot, by: Point): Spot => ({
  at: { x: at.x + by.x, y: at.y + by.y },
  align,
  box: { ...box, x: box.x + by.x, y: box.y + by.y },
});
