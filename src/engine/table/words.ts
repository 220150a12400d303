/** The words of a state: verdicts of actuators and pumps, classes of lines, kinds of trapped pressure. */

/** In the order of decision; `rests on pressure` = open paths leave it to loads, rivals or settings. */
export const ACTUATOR_VERDICTS = [
  'undetermined',
  'extends',
  'retracts',
  'turns A→B',
  'turns B→A',
  'moved out by load',
  'moved in by load',
  'moved out by spring',
  'moved in by spring',
  'driven A→B by load',
  'driven B→A by load',
  'at stop',
  'stalled',
  'held',
  'held one way',
  'floats',
  'rests on pressure',
] as const;
export type ActuatorVerdict = (typeof ACTUATOR_VERDICTS)[number];

export const PUMP_VERDICTS = [
  'working',
  'working, part over relief',
  'over relief',
  'unloaded',
  'destroked',
  'dead-headed',
  'stopped',
  'rests on pressure',
] as const;
export type PumpVerdict = (typeof PUMP_VERDICTS)[number];

export const LINE_CLASSES = ['fed', 'flows to tank', 'vented', 'cut off', 'carries displaced oil'] as const;
export type LineClass = (typeof LINE_CLASSES)[number];

export const BLOCKED_KINDS = ['under pressure', 'cut off'] as const;
export type BlockedKind = (typeof BLOCKED_KINDS)[number];

export const TRAP_REASONS = ['load', 'left behind', 'stopped', 'stored', 'heat'] as const;
export type TrapReason = (typeof TRAP_REASONS)[number];

/** Remarks on an actuator's verdict that do not change the word. */
export const ACTUATOR_NOTES = [
  'outward by suction only',
  'inward by suction only',
  'void forms',
  'free outward',
  'free inward',
  'creeps outward on back pressure',
  'creeps inward on back pressure',
  'creeps through its own leakage',
] as const;
export type ActuatorNote = (typeof ACTUATOR_NOTES)[number];

export { REST_REASONS } from '../paths/motion-bits.ts';
export type { RestReason } from '../paths/motion-bits.ts';
