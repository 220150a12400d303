import type { NetActuator } from '../../network/network.ts';

export const isEqualSided = (actuator: NetActuator): boolean =>
  actuator.b >= 0 && Math.abs(actuator.areaA - actuator.areaB) <= 1e-9 * Math.max(actuator.areaA, actuator.areaB);

/** All ones if a load works against a motion that would undo its push `sense`. */
export const loadAgainst =
  ({ push, resisting }: NetActuator) =>
  (sense: 'in' | 'out'): number =>
    resisting || push.way === 'both' || (push.by === 'load' && push.way === sense) ? -1 : 0;

/** All ones if a load or spring pushes it this way also at rest. */
export const pushes = ({ push }: NetActuator, way: 'in' | 'out'): number =>
  push.way === way || push.way === 'both' ? -1 : 0;
