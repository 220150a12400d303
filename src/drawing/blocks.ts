import type { Box } from '../base/points.ts';
import { union } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import type { Circuit } from '../circuit/model.ts';
import { inflate } from './geometry.ts';
import { partReach } from './shapes.ts';

/** The enclosure of parts that belong together, such as a manifold block. */
export interface SceneBlock {
  readonly id: string;
  readonly name: string;
  readonly box: Box;
  readonly primitives: readonly Primitive[];
}

/** Modules between the parts and their enclosure, and room for its name inside. */
const MARGIN = 2;
const NAME = 1.4;

export function sceneBlocks(circuit: Circuit): SceneBlock[] {
  const parts = new Map(circuit.parts.map((part) => [part.id, part]));
  return (circuit.groups ?? []).flatMap(({ id, name, parts: ids }) => {
    const around = union(ids.flatMap((each) => parts.get(each) ?? []).map(partReach));
    if (!around) return [];
    const wide = inflate(around, MARGIN);
    const box = { ...wide, y: wide.y - NAME, height: wide.height + NAME };
    const primitives: Primitive[] = [
      { type: 'box', ...box, pen: 'enclosure' },
      {
        type: 'text',
        at: { x: box.x + 0.8, y: box.y + 1.9 },
        text: name,
        size: 1.5,
        align: 'start',
        weight: 600,
        tone: 'second',
      },
    ];
    return [{ id, name, box, primitives }];
  });
}
