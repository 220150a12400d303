import { actuatorReach } from './actuator-reach.ts';
import { deadHeadedPump } from './dead-headed-pump.ts';
import type { Evidence, Finding, Rule } from './finding.ts';
import { idleValveUnloads } from './idle-valve-unloads.ts';
import { loadNotHeld } from './load-not-held.ts';
import { lockCheckNotVented } from './lock-check-not-vented.ts';
import { openPort } from './open-port.ts';
import { overReliefAtRest } from './over-relief-at-rest.ts';
import { positionChangesNothing } from './position-changes-nothing.ts';
import { undischargedAccumulator } from './undischarged-accumulator.ts';
import { unventableLine } from './unventable-line.ts';

/** One rule per design fault; a new one is a new file and a line here. */
const RULES: readonly Rule[] = [
  deadHeadedPump,
  loadNotHeld,
  undischargedAccumulator,
  idleValveUnloads,
  lockCheckNotVented,
  overReliefAtRest,
  actuatorReach,
  unventableLine,
  openPort,
  positionChangesNothing,
];

const LEVELS = ['danger', 'caution', 'note'];

/** All findings, the dangers first. */
export function findFaults(evidence: Evidence): Finding[] {
  return RULES.flatMap((rule) => rule(evidence)).sort((a, b) => LEVELS.indexOf(a.level) - LEVELS.indexOf(b.level));
}
