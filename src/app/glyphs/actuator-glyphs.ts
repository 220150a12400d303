import type { ActuatorVerdict } from '../../worker/client.ts';

/**
 * One small drawing per verdict on a 16-field, 1.5 px strokes, with the rod pointing right: the view turns it the
 * way the rod points on the sheet. The bar is the machine frame; a filled head means oil drives, an open head
 * means something else does.
 */
export interface Glyph {
  readonly stroke?: string;
  readonly fill?: string;
  readonly dashed?: string;
  /** Turned with the rod; motors and round marks stay upright. */
  readonly turns: boolean;
}

const FRAME = 'M2.5 3v10';
const ARC_RIGHT = 'M12.4 11.2A5.3 5.3 0 1 1 13.3 7.6';
const HEAD_RIGHT = 'M10.6 6.4 13.5 9.8 15.6 5.9Z';
const ARC_LEFT = 'M3.6 11.2A5.3 5.3 0 1 0 2.7 7.6';
const HEAD_LEFT = 'M5.4 6.4 2.5 9.8.4 5.9Z';
const SQUARE = 'M5.5 5.5h5v5h-5z';

const MOTIONS: Readonly<Record<ActuatorVerdict, Glyph>> = {
  extends: { stroke: `${FRAME}M2.5 8H11`, fill: 'M15 8 10 4.8v6.4Z', turns: true },
  retracts: { stroke: `${FRAME}M8 8h7`, fill: 'M4 8 9 4.8v6.4Z', turns: true },
  'turns A→B': { stroke: ARC_RIGHT, fill: HEAD_RIGHT, turns: false },
  'turns B→A': { stroke: ARC_LEFT, fill: HEAD_LEFT, turns: false },
  'moved out by load': { stroke: `${FRAME}M15 8 10.5 5v6Z`, dashed: 'M3.5 8h7', turns: true },
  'moved in by load': { stroke: `${FRAME}M4 8 8.5 5v6Z`, dashed: 'M8.5 8H16', turns: true },
  'moved out by spring': { stroke: `${FRAME}M2.5 8 4 5.5l2 5 2-5 1.7 4M15 8 10.5 5v6Z`, turns: true },
  'moved in by spring': { stroke: `${FRAME}M4 8 8.5 5v6ZM9 7l1.5 3.5 2-5 2 5 1-2.5`, turns: true },
  'driven A→B by load': { stroke: HEAD_RIGHT, dashed: ARC_RIGHT, turns: false },
  'driven B→A by load': { stroke: HEAD_LEFT, dashed: ARC_LEFT, turns: false },
  'at stop': { stroke: 'M12.5 2.5v11M14.5 3v10M1 8h5', fill: 'M11 8 6 4.8v6.4Z', turns: true },
  stalled: { stroke: 'M1 8h4M12 4l3 8M15 4l-3 8', fill: 'M10 8 5 4.8v6.4Z', turns: true },
  held: { stroke: 'M2.5 3v10M13.5 3v10', fill: SQUARE, turns: true },
  'held one way': { stroke: 'M2.5 3v10M11.5 8H13M12.5 5 15 8l-2.5 3', fill: SQUARE, turns: true },
  floats: { stroke: 'M3.5 5 1 8l2.5 3M12.5 5 15 8l-2.5 3M5.5 5.5h5v5h-5z', turns: true },
  'rests on pressure': { stroke: 'M8 8.5 11 5', dashed: 'M8 2.5a5.5 5.5 0 1 0 .01 0', turns: false },
  undetermined: {
    stroke: 'M5.7 6.3a2.4 2.4 0 1 1 3.6 2.1C8.3 9 8 9.3 8 10.3',
    fill: 'M7.2 11.8h1.6v1.6h-1.6z',
    dashed: 'M1.5 1.5h13v13h-13z',
    turns: false,
  },
};

/** `freeInward`: the free side of a one-way hold is the inward one. */
export function actuatorGlyph(verdict: ActuatorVerdict, freeInward: boolean): Glyph {
  if (verdict === 'held one way' && freeInward) {
    return { stroke: 'M13.5 3v10M4.5 8H3M3.5 5 1 8l2.5 3', fill: SQUARE, turns: true };
  }
  return MOTIONS[verdict];
}
