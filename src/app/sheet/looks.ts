import type { LineLook } from '../../drawing/strokes.ts';
import type { ActuatorVerdict, TrapReason } from '../../worker/client.ts';
import type { ConnectionLook } from '../state/session.svelte.ts';
import type { FlowWay } from './flow-ways.ts';

/** Reasons for which pressure stands there now; heat only raises it once the oil warms up. */
const KNOWN: readonly TrapReason[] = ['load', 'left behind', 'stopped', 'stored'];

/** Dense hatch for what stands there, sparse for heat alone. */
export function trappedLook(reasons: readonly TrapReason[]): 'known' | 'possible' | undefined {
  if (reasons.some((reason) => KNOWN.includes(reason))) return 'known';
  return reasons.length > 0 ? 'possible' : undefined;
}

export function lineLook(look: ConnectionLook | undefined, way: FlowWay | undefined): LineLook {
  if (!look) return { class: 'idle' };
  const trapped = trappedLook(look.trapped);
  return {
    class: look.class,
    ...(trapped && { trapped }),
    ...(look.blocked === 'under pressure' && { blocked: true }),
    ...(look.class === 'flows to tank' && { flow: way ?? 'unknown' }),
  };
}

/** Which way the actuator goes: 1 out (or A→B), −1 in, and whether oil drives it. */
export interface Motion {
  readonly way: 1 | -1;
  readonly driven: boolean;
}

const MOTIONS: Partial<Record<ActuatorVerdict, Motion>> = {
  extends: { way: 1, driven: true },
  retracts: { way: -1, driven: true },
  'turns A→B': { way: 1, driven: true },
  'turns B→A': { way: -1, driven: true },
  'moved out by load': { way: 1, driven: false },
  'moved in by load': { way: -1, driven: false },
  'moved out by spring': { way: 1, driven: false },
  'moved in by spring': { way: -1, driven: false },
  'driven A→B by load': { way: 1, driven: false },
  'driven B→A by load': { way: -1, driven: false },
};

export const motionOf = (verdict: ActuatorVerdict): Motion | undefined => MOTIONS[verdict];
