import type { Box } from '../../base/points.ts';
import { boxOfPoints, inflate, overlaps } from '../../drawing/geometry.ts';
import { labelBox } from '../../drawing/labels.ts';
import type { SceneLabel } from '../../drawing/labels.ts';
import type { Laid } from '../../drawing/moving.ts';
import type { SceneLine, ScenePart } from '../../drawing/scene.ts';

/** A sheet of fewer parts is drawn whole: to leave some out would save nothing. */
const FEW = 150;
/** Modules round a part: a valve's boxes move out of its outline, and arrows of motion stand beside it. */
const ROUND_PART = 12;
const ROUND = 2;

function once<T extends object>(of: (item: T) => Box): (item: T) => Box {
  const known = new WeakMap<T, Box>();
  return (item) => {
    let box = known.get(item);
    if (!box) known.set(item, (box = of(item)));
    return box;
  };
}

const partRoom = once((part: ScenePart) => inflate(part.box, ROUND_PART));
const lineRoom = once((line: SceneLine) =>
  inflate(boxOfPoints(line.points) ?? { x: 0, y: 0, width: 0, height: 0 }, ROUND),
);
const labelRoom = once((label: SceneLabel) => inflate(labelBox(label), ROUND));

/** What of it reaches into the region. */
export function within(region: Box, scene: Laid): Laid {
  if (scene.parts.length < FEW) return scene;
  return {
    blocks: scene.blocks.filter(({ box }) => overlaps(inflate(box, ROUND), region)),
    lines: scene.lines.filter((line) => overlaps(lineRoom(line), region)),
    dots: scene.dots.filter(({ at }) => overlaps({ x: at.x - 1, y: at.y - 1, width: 2, height: 2 }, region)),
    labels: scene.labels.filter((label) => overlaps(labelRoom(label), region)),
    parts: scene.parts.filter((part) => overlaps(partRoom(part), region)),
  };
}
