import { actuatorReach } from './actuator-reach.ts';
import { coilTagTwice } from './coil-tag-twice.ts';
import { deadHeadedPump } from './dead-headed-pump.ts';
import { dependentUnsettled } from './dependent-unsettled.ts';
import type { Evidence, Finding, Rule } from './finding.ts';
import { idleValveUnloads } from './idle-valve-unloads.ts';
import { intensified } from './intensified.ts';
import { loadNotHeld } from './load-not-held.ts';
import { lockCheckNotVented } from './lock-check-not-vented.ts';
import { loweringNotControlled } from './lowering-not-controlled.ts';
import { openPort } from './open-port.ts';
import { overRating } from './over-rating.ts';
import { overReliefAtRest } from './over-relief-at-rest.ts';
import { positionChangesNothing } from './position-changes-nothing.ts';
import { sequenceDrain } from './sequence-drain.ts';
import { tankPortPressure } from './tank-port-pressure.ts';
import { twoStageNoPilot } from './two-stage-no-pilot.ts';
import { undischargedAccumulator } from './undischarged-accumulator.ts';
import { unventableLine } from './unventable-line.ts';
import { wrongWayRound } from './wrong-way-round.ts';

/** One rule per design fault; a new one is a new file and a line here. */
const RULES: readonly Rule[] = [
  deadHeadedPump,
  loadNotHeld,
  overRating,
  intensified,
  tankPortPressure,
  loweringNotControlled,
  wrongWayRound,
  sequenceDrain,
  undischargedAccumulator,
  idleValveUnloads,
  twoStageNoPilot,
  dependentUnsettled,
  lockCheckNotVented,
  overReliefAtRest,
  actuatorReach,
  unventableLine,
  openPort,
  coilTagTwice,
  positionChangesNothing,
];

const LEVELS = ['danger', 'caution', 'note'];

/** All findings, the dangers first. */
export function findFaults(evidence: Evidence): Finding[] {
  return RULES.flatMap((rule) => rule(evidence)).sort((a, b) => LEVELS.indexOf(a.level) - LEVELS.indexOf(b.level));
}
