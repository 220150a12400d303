import type { Point } from '../base/points.ts';
import type { ColourToken } from './palette.ts';

/** Screen pixels of one module at 100 %. Weights and dashes are given in these pixels. */
export const MODULE_PX = 8;

export type LineUse = 'working' | 'pilot' | 'drain';
export type LineLookClass = 'idle' | 'fed' | 'flows to tank' | 'vented' | 'cut off' | 'carries displaced oil';

/** How one connection looks in the state that is shown. */
export interface LineLook {
  readonly class: LineLookClass;
  /** `known`: pressure is known to stand in it; `possible`: it may. */
  readonly trapped?: 'known' | 'possible';
  /** Under pump pressure with no steady flow. */
  readonly blocked?: boolean;
  /** Which way oil runs, seen from the first point of the drawn route. */
  readonly flow?: 'forward' | 'backward' | 'unknown';
}

/** One drawn line look: several open strokes with the same pen. Points are in modules on the sheet. */
export interface Stroke {
  readonly role: 'core' | 'band' | 'hatch' | 'chevron' | 'end-bar' | 'gap' | 'block-bar';
  readonly lines: readonly (readonly Point[])[];
  readonly colour: ColourToken;
  /** Pixels at 8 px a module. */
  readonly weight: number;
  /** Pixels at 8 px a module. */
  readonly dash?: readonly number[];
  readonly cap: 'butt' | 'square' | 'round';
  /** 0 to 1; absent = 1. */
  readonly opacity?: number;
}

const number = (v: number): string => String(Math.round(v * 1000) / 1000);

/** SVG path data of open polylines, in modules. */
export function pathData(lines: readonly (readonly Point[])[], closed = false): string {
  return lines
    .filter((points) => points.length > 0)
    .map((points) => `M${points.map((p) => `${number(p.x)} ${number(p.y)}`).join('L')}${closed ? 'Z' : ''}`)
    .join('');
}
