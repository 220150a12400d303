import type { Laid, Moves } from '../../drawing/moving.ts';
import type { Scene } from '../../drawing/scene.ts';

/** What the hand holds, wherever it has it by now. */
export type Held = Omit<Moves, 'by'>;

const same = <T>(a: ReadonlySet<T>, b: ReadonlySet<T>): boolean => a.size === b.size && [...a].every((id) => b.has(id));

/** `before` itself if the hand holds the same as then. */
export function heldOf(moves: Moves | undefined, before: Held | undefined): Held | undefined {
  if (!moves) return undefined;
  const { by: _, ...held } = moves;
  const keys = ['parts', 'labels', 'blocks', 'carried', 'laid'] as const;
  return before && keys.every((key) => same<string | number>(before[key], held[key])) ? before : held;
}

/** Of the drawing at rest, what goes along as it is, or else what stands still; neither holds what is laid anew. */
export function heldItems(scene: Scene, held: Held, along: boolean): Laid {
  const lineOf = new Map(scene.lines.map(({ connection, line }) => [connection, line]));
  const goes = (line: number): boolean =>
    along ? held.carried.has(line) : !held.carried.has(line) && !held.laid.has(line);
  return {
    parts: scene.parts.filter(({ id }) => held.parts.has(id) === along),
    lines: scene.lines.filter(({ line }) => goes(line)),
    dots: scene.dots.filter(({ line }) => goes(line)),
    labels: scene.labels.filter(({ role, owner }) => {
      if (role === 'line') return goes(lineOf.get(owner) ?? -1);
      return (role === 'free' ? held.labels : held.parts).has(owner) === along;
    }),
    blocks: along ? [] : scene.blocks.filter(({ id }) => !held.blocks.has(id)),
  };
}
