import { isEmpty } from '../../base/bits.ts';
import type { SettledBlock } from '../paths/block.ts';
import { REST_REASONS } from '../paths/motion-bits.ts';
import type { ActuatorOutcome } from './actuator-outcomes.ts';
import type { DependentRows } from './dependents.ts';
import type { PlanePool, PlaneSheet } from './planes.ts';
import { settle } from './resolve-block.ts';
import type { Plane, TableData } from './table-data.ts';
import type { Touched } from './touched.ts';
import { ACTUATOR_VERDICTS, PUMP_VERDICTS } from './words.ts';

/** Rows whose verdicts rest on values: all together, by actuator and by pump. */
interface DoubtSheets {
  readonly valued: PlaneSheet;
  readonly valuedActuators: PlaneSheet;
  readonly valuedPumps: PlaneSheet;
}

const UNDETERMINED = ACTUATOR_VERDICTS.indexOf('undetermined');
const RESTS = ACTUATOR_VERDICTS.indexOf('rests on pressure');
const PUMP_RESTS = PUMP_VERDICTS.indexOf('rests on pressure');
const DEPENDENT = REST_REASONS.indexOf('dependent valve');

/**
 * What a dependent valve touches: where pressures have put it, its verdict rests on values; where it hunts,
 * nobody can say; and where only open paths have put it, pressures have to.
 */
export function doubt(
  sheets: DoubtSheets,
  dependents: DependentRows,
  touched: Touched,
  at: number,
  width: number,
  block: SettledBlock,
  actuators: readonly ActuatorOutcome[],
  pumps: readonly (readonly Uint32Array[])[],
): void {
  const { byPressure, hunts } = dependents;
  const into = (plane: Uint32Array | undefined, w: number, bits: number): void => {
    if (plane) plane[w] = (plane[w] as number) | bits;
  };
  for (let w = 0; w < width; w++) {
    const open = byPressure ? (hunts[at + w] as number) : -1;
    touched.actuators.forEach((plane, i) => {
      const bits = (plane[w] as number) & open;
      if (bits === 0) return;
      settle(actuators[i]?.verdicts ?? [], byPressure ? UNDETERMINED : RESTS, w, bits);
      into(block.motion.rests[i]?.[DEPENDENT], w, bits);
    });
    touched.pumps.forEach((plane, i) => {
      const bits = (plane[w] as number) & open;
      if (bits !== 0) settle(pumps[i] ?? [], PUMP_RESTS, w, bits);
    });
  }
  if (!byPressure) return;
  touched.actuators.forEach((plane, i) => {
    sheets.valuedActuators.add(i, 0, at, plane);
    sheets.valued.add(0, 0, at, plane);
  });
  touched.pumps.forEach((plane, i) => {
    sheets.valuedPumps.add(i, 0, at, plane);
    sheets.valued.add(0, 0, at, plane);
  });
}

export function dependentPlanes(
  rows: DependentRows | undefined,
  pool: PlanePool,
): Pick<TableData, 'dependentPlanes' | 'dependentRests' | 'dependentHunts' | 'dependentOthers' | 'dependentsSearched'> {
  const share = (plane: Plane | undefined): Plane | undefined =>
    plane === undefined || isEmpty(plane) ? undefined : pool.share(plane);
  // What open paths say of hunting and of history is for the pressures to confirm.
  const sure = rows?.byPressure === true;
  return {
    dependentPlanes: rows?.planes.map((planes) => planes.map(share)) ?? [],
    dependentRests: rows?.moved.map((plane) => (sure ? undefined : share(plane))) ?? [],
    dependentHunts: sure ? share(rows.hunts) : undefined,
    dependentOthers: rows?.others.map((planes) => planes.map((plane) => (sure ? share(plane) : undefined))) ?? [],
    dependentsSearched: rows?.searched ?? true,
  };
}
