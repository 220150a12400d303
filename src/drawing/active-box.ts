import type { Point } from '../base/points.ts';
import type { PathPen, Primitive } from '../base/primitives.ts';

/** Port of the symbol's own frame, and the pen of the line that is at it. */
export interface PortPen {
  readonly at: Point;
  readonly pen: PathPen;
}

type Group = Extract<Primitive, { type: 'group' }>;
const NEAR = 0.02;
const near = (a: Point, b: Point): boolean => Math.abs(a.x - b.x) < NEAR && Math.abs(a.y - b.y) < NEAR;

/**
 * In a shown state the box at the ports is outlined, and each of its paths is drawn as the line that
 * it takes part in. Works on a symbol in its own frame, before it is placed.
 */
export function showActiveBox(primitives: readonly Primitive[], ports: readonly PortPen[]): Primitive[] {
  return primitives.map((p) => {
    if (p.type !== 'group' || p.role !== 'strip') return p;
    const at = p.children.findIndex((c) => isAtPorts(c, p));
    const box = p.children[at];
    if (box?.type !== 'group') return p;
    // Last, so that its outline is whole.
    return {
      ...p,
      children: [...p.children.filter((_, i) => i !== at), { ...box, children: colourPaths(box.children, ports) }],
    };
  });
}

const isAtPorts = (child: Primitive, strip: Group): boolean =>
  child.type === 'group' &&
  child.role === 'box' &&
  near({ x: child.shift.x + strip.shift.x, y: child.shift.y + strip.shift.y }, { x: 0, y: 0 });

function colourPaths(children: readonly Primitive[], ports: readonly PortPen[]): Primitive[] {
  const pens = new Map<Primitive, PathPen>();
  const strokes = children.filter((c) => c.type === 'polyline' && c.pen === 'active');
  for (const stroke of strokes) {
    const port = ports.find((each) => pointsOf(stroke).some((p) => near(p, each.at)));
    if (port) pens.set(stroke, port.pen);
  }
  // What hangs on a coloured path follows it: bars of shut ports, buses of joined ones.
  for (let grown = true; grown;) {
    grown = false;
    for (const stroke of strokes) {
      if (pens.has(stroke)) continue;
      const known = [...pens.keys()].find((other) => touches(stroke, other));
      const pen = known && pens.get(known);
      if (!pen) continue;
      pens.set(stroke, pen);
      grown = true;
    }
  }
  return children.map((c): Primitive => {
    if (c.type === 'box' && c.pen === 'symbol') return { ...c, pen: 'chosen' };
    const pen = pens.get(c);
    if (!pen || c.type !== 'polyline') return c;
    return c.closed ? { ...c, pen: 'unseen', fill: pen } : { ...c, pen };
  });
}

const pointsOf = (p: Primitive): readonly Point[] => (p.type === 'polyline' ? p.points : []);

function touches(a: Primitive, b: Primitive): boolean {
  return pointsOf(a).some((p) => onPath(p, pointsOf(b))) || pointsOf(b).some((p) => onPath(p, pointsOf(a)));
}

function onPath(p: Point, path: readonly Point[]): boolean {
  return path.some((b, i) => {
    const a = path[i - 1];
    if (!a) return false;
    const size = Math.hypot(b.x - a.x, b.y - a.y);
    const along = size === 0 ? 0 : ((p.x - a.x) * (b.x - a.x) + (p.y - a.y) * (b.y - a.y)) / size;
    const off =
      size === 0
        ? Math.hypot(p.x - a.x, p.y - a.y)
        : Math.abs((p.x - a.x) * (b.y - a.y) - (p.y - a.y) * (b.x - a.x)) / size;
    return off < NEAR && along >= -NEAR && along <= size + NEAR;
  });
}
