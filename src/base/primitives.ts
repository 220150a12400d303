import type { Point } from './points.ts';

/**
 * What symbols and sheets are drawn with. The screen, the exported SVG and the symbol tests all
 * render this one list, so that they cannot differ.
 *
 * `pen` names a role, not a colour: the theme gives it colour, weight and dash.
 */
export type Pen =
  | 'symbol' // outline of a part
  | 'fine' // inner detail
  | 'idle' // paths in a box that is not at the ports
  | 'active' // paths in the box at the ports
  | 'pilot' // dashed pilot, drain and bleed
  | 'enclosure' // dash-dot
  | 'chosen' // outline of the box at the ports, in a shown state
  | 'unseen' // no outline: filled shapes only
  | 'trace' // curve of a diagram
  | 'hair' // scale of a diagram
  | 'boundary' // dashed: between the steps of a diagram
  | PathPen;

/** A path inside a symbol that takes part in a line, in a shown state: drawn as its line is. */
export type PathPen = 'fed' | 'flows-to-tank' | 'vented' | 'cut-off' | 'displaced' | 'trapped';

export type Fill = 'none' | 'ink' | 'paper' | 'idle' | 'active' | PathPen;

export type Primitive =
  | {
      readonly type: 'polyline';
      readonly points: readonly Point[];
      readonly pen: Pen;
      readonly closed?: boolean;
      readonly fill?: Fill;
    }
  | {
      readonly type: 'circle';
      readonly centre: Point;
      readonly radius: number;
      readonly pen: Pen;
      readonly fill?: Fill;
    }
  /** Arc from `from` to `to` about `centre`, clockwise on the sheet. */
  | {
      readonly type: 'arc';
      readonly from: Point;
      readonly to: Point;
      readonly radius: number;
      readonly large?: boolean;
      readonly clockwise?: boolean;
      readonly pen: Pen;
    }
  | {
      readonly type: 'box';
      readonly x: number;
      readonly y: number;
      readonly width: number;
      readonly height: number;
      readonly pen: Pen;
      readonly fill?: Fill;
      readonly corner?: number;
    }
  /** Text is never turned with its part; `size` in modules. */
  | {
      readonly type: 'text';
      readonly at: Point;
      readonly text: string;
      readonly size: number;
      readonly align: 'start' | 'middle' | 'end';
      readonly weight?: 400 | 500 | 600;
      readonly tone?: 'ink' | 'second' | 'mute' | 'accent';
      /** What keeps its place when the symbol is turned and the text stays upright; the baseline when absent. */
      readonly held?: 'top';
    }
  /** A group that moves as one when a valve is shifted; `role` is for the view's motion and marks. */
  | {
      readonly type: 'group';
      readonly role: 'strip' | 'box' | 'operator' | 'piston';
      readonly index?: number;
      readonly shift: Point;
      readonly clip?: { readonly x: number; readonly y: number; readonly width: number; readonly height: number };
      readonly children: readonly Primitive[];
    };
