import type { Fill, Pen } from '../base/primitives.ts';

/** The one source of colours, weights and dashes, for the sheet, the interface and exported files. */
export type Theme = 'light' | 'dark';

export const SURFACE_TOKENS = ['paper', 'chrome', 'panel', 'current-row', 'folded-band'] as const;
export const TEXT_TOKENS = ['ink', 'second', 'mute', 'accent'] as const;
export const QUIET_TOKENS = ['rule', 'hair', 'idle'] as const;
/** Line colours follow Okabe and Ito's colour-blind safe set, tuned for 3:1 on the paper. */
export const LINE_TOKENS = ['fed', 'flows-to-tank', 'vented', 'cut-off', 'displaced', 'trapped'] as const;

export type SurfaceToken = (typeof SURFACE_TOKENS)[number];
export type TextToken = (typeof TEXT_TOKENS)[number];
export type LineToken = (typeof LINE_TOKENS)[number];
export type ColourToken = SurfaceToken | TextToken | (typeof QUIET_TOKENS)[number] | LineToken;

export const PALETTE: Readonly<Record<Theme, Readonly<Record<ColourToken, string>>>> = {
  light: {
    paper: '#FCFBF8',
    chrome: '#F3F1EA',
    panel: '#FFFFFF',
    'current-row': '#DFECF4',
    'folded-band': '#F0EEE6',
    ink: '#1C1E20',
    second: '#4E5054',
    mute: '#62625C',
    rule: '#8B867A',
    hair: '#DAD6CB',
    idle: '#7E7B73',
    accent: '#005F9E',
    fed: '#C24A00',
    'flows-to-tank': '#008A66',
    vented: '#7F858B',
    'cut-off': '#1C1E20',
    displaced: '#4E5054',
    trapped: '#84205F',
  },
  dark: {
    paper: '#15181B',
    chrome: '#1D2125',
    panel: '#20252A',
    'current-row': '#16364A',
    'folded-band': '#23282D',
    ink: '#ECE9E1',
    second: '#C2C0B8',
    mute: '#A6A69F',
    rule: '#7E868E',
    hair: '#343A40',
    idle: '#8C939A',
    accent: '#6CBDEE',
    fed: '#F58238',
    'flows-to-tank': '#22A880',
    vented: '#767E86',
    'cut-off': '#ECE9E1',
    displaced: '#C2C0B8',
    trapped: '#F2A9D4',
  },
};

/** Black on white, for paper: what would be a colour or a tint is told by weight and dash alone. */
export const PRINT: Readonly<Record<ColourToken, string>> = {
  ...(Object.fromEntries(Object.keys(PALETTE.light).map((token) => [token, '#000000'])) as Record<ColourToken, string>),
  ...(Object.fromEntries(SURFACE_TOKENS.map((token) => [token, '#FFFFFF'])) as Record<SurfaceToken, string>),
  rule: '#555555',
  hair: '#999999',
  idle: '#555555',
};

export interface PenStyle {
  readonly colour: ColourToken;
  /** Pixels at 8 px a module. */
  readonly weight: number;
  readonly dash?: readonly number[];
}

export const PENS: Readonly<Record<Pen, PenStyle>> = {
  symbol: { colour: 'ink', weight: 1.5 },
  fine: { colour: 'ink', weight: 1.25 },
  idle: { colour: 'idle', weight: 1.25 },
  active: { colour: 'ink', weight: 1.75 },
  pilot: { colour: 'second', weight: 1.25, dash: [4, 2.5] },
  enclosure: { colour: 'idle', weight: 1.25, dash: [8, 2.5, 1.5, 2.5] },
  chosen: { colour: 'accent', weight: 2.25 },
  unseen: { colour: 'ink', weight: 0 },
  trace: { colour: 'ink', weight: 2.25 },
  hair: { colour: 'rule', weight: 0.75 },
  boundary: { colour: 'rule', weight: 0.75, dash: [2, 2.5] },
  fed: { colour: 'fed', weight: 3.5 },
  'flows-to-tank': { colour: 'flows-to-tank', weight: 2 },
  vented: { colour: 'vented', weight: 1.25 },
  'cut-off': { colour: 'cut-off', weight: 1.75 },
  displaced: { colour: 'displaced', weight: 1.75 },
  trapped: { colour: 'trapped', weight: 1.75 },
};

export const FILLS: Readonly<Record<Fill, ColourToken | 'none'>> = {
  none: 'none',
  ink: 'ink',
  paper: 'paper',
  idle: 'idle',
  active: 'ink',
  fed: 'fed',
  'flows-to-tank': 'flows-to-tank',
  vented: 'vented',
  'cut-off': 'cut-off',
  displaced: 'displaced',
  trapped: 'trapped',
};

/** Weights in pixels at 8 px a module. */
export const LINE_WEIGHTS = {
  idle: 1.5,
  fed: 3.5,
  'flows to tank': 2,
  vented: 1,
  'cut off': 1.75,
  /** Outer width of the double line and of the gap inside it. */
  'carries displaced oil': 3.5,
  displacedGap: 1.5,
  pilot: 1.5,
  endBar: 2,
  trappedBand: 9,
  possibleBand: 6,
  hatch: 1.6,
  trappedCore: 1.5,
} as const;

export const PILOT_DASH: readonly number[] = [4, 2.5];
/** Shorter than that of a pilot line, so that the two are told apart without colour. */
export const DRAIN_DASH: readonly number[] = [1.75, 1.75];

/** Fallback list that any viewer can serve. */
export const FONT_FAMILY = "Inter, 'Inter Variable', 'Helvetica Neue', Arial, sans-serif";
/** Text sizes in pixels at 8 px a module. */
export const TEXT_SIZES = { letter: 11, code: 12, label: 13, actuator: 15 } as const;

/** `--paper: #FCFBF8; …`, ready for a rule's braces. */
export const cssVariables = (theme: Theme): string =>
  Object.entries(PALETTE[theme])
    .map(([token, value]) => `--${token}: ${value};`)
    .join('\n');
