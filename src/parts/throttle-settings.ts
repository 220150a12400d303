import type { Primitive } from '../base/primitives.ts';
import type { Part } from '../circuit/model.ts';
import type { PathElement } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { readSwitch, switchSetting } from './settings.ts';
import { arrow, throttleArcs } from './shapes.ts';

/** What throttles with and without a check share. */
const SHUT = switchSetting(
  { id: 'shut', title: 'Screwed shut', help: 'On: the throttle is closed and passes nothing.' },
  false,
);
const LOSS = lossSettings('10 L/min', '40 bar');

export const THROTTLE_SETTINGS = [SHUT, ...LOSS.all];

export const throttledPaths = (part: Part): PathElement[] =>
  readSwitch(part, SHUT)
    ? []
    : [{ type: 'path', from: 'A', to: 'B', way: 'both', throttled: true, rated: readLoss(part, LOSS) }];

/** Arcs and the arrow that says adjustable, about (0, 0) on an upright line. */
export const adjustableThrottle = (): Primitive[] => [
  ...throttleArcs('symbol', [0, 0], [0, -1]),
  ...arrow('fine', [-2, 2], [2, -2], 0.9, 0.65),
];
