import type { Point } from '../../base/points.ts';
import { TRAVEL } from '../../parts/cylinder-body.ts';
import { lineLook } from './looks.ts';
import type { ConnectionLook } from '../state/session.svelte.ts';

export type ChamberLook = 'fed' | 'known' | 'possible';
export type ChamberLooks = Readonly<Partial<Record<'A' | 'B', ChamberLook>>>;

export interface Chamber {
  readonly port: 'A' | 'B';
  /** Corners of boxes, clear of piston and rod, in the part's own frame. */
  readonly boxes: readonly (readonly Point[])[];
}

/** Left face of the retracted piston, and whether a rod leaves at the left, by kind; as the symbols are drawn. */
const PISTONS: Readonly<Record<string, { readonly left: number; readonly through: boolean }>> = {
  cylinder: { left: -4, through: false },
  'double-rod-cylinder': { left: -3.5, through: true },
  'single-acting-cylinder': { left: -4, through: false },
};
const END = 6;
const BORE = 2;
const ROD = 0.5;
/** Half of a symbol stroke, which stays clear. */
const EDGE = 0.1;
/** Where a stroke is drawn that nobody set. */
const MIDDLE = 0.25;

export function chambersOf(kind: string, stroke: number | undefined): Chamber[] {
  const piston = PISTONS[kind];
  if (!piston) return [];
  const left = piston.left + TRAVEL * Math.min(1, Math.max(0, stroke ?? MIDDLE));
  const right = left + 1;
  const wide = (from: number, to: number): Point[][] => [box(from, -BORE, to, BORE)];
  const round = (from: number, to: number): Point[][] => [box(from, -BORE, to, -ROD), box(from, ROD, to, BORE)];
  return [
    { port: 'A', boxes: piston.through ? round(-END, left) : wide(-END, left) },
    { port: 'B', boxes: round(right, END) },
  ];
}

const box = (x0: number, y0: number, x1: number, y1: number): Point[] => [
  { x: x0 + EDGE, y: y0 + EDGE },
  { x: Math.max(x0, x1) - EDGE, y: y0 + EDGE },
  { x: Math.max(x0, x1) - EDGE, y: y1 - EDGE },
  { x: x0 + EDGE, y: y1 - EDGE },
];

/** Only what a person must know of: oil under pump pressure, and oil that pressure is trapped in. */
export function chamberLook(look: ConnectionLook | undefined): ChamberLook | undefined {
  const drawn = lineLook(look, undefined);
  return drawn.trapped ?? (drawn.class === 'fed' ? 'fed' : undefined);
}
