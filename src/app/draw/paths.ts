import type { Point } from '../../base/points.ts';
import type { Primitive } from '../../base/primitives.ts';

export function polylinePath(points: readonly Point[], closed: boolean): string {
  const d = points.map((p, i) => `${i === 0 ? 'M' : 'L'}${p.x} ${p.y}`).join('');
  return closed ? `${d}Z` : d;
}

export function arcPath(arc: Extract<Primitive, { type: 'arc' }>): string {
  const large = arc.large ? 1 : 0;
  const sweep = (arc.clockwise ?? true) ? 1 : 0;
  return `M${arc.from.x} ${arc.from.y}A${arc.radius} ${arc.radius} 0 ${large} ${sweep} ${arc.to.x} ${arc.to.y}`;
}
