import type { Budget } from '../../../base/budget.ts';
import type { Network } from '../../../network/network.ts';
import type { Machine } from './machine.ts';
import { Player } from './player.ts';
import type { RunEnd } from './player.ts';

/** What goes: the control voltage, the pumps, or both. */
export interface Loss {
  readonly coils: boolean;
  readonly pumps: boolean;
}

export type LossOutcome =
  'holds' | 'drops' | 'creeps' | 'moves by spring' | 'moves by stored oil' | 'goes on' | 'starts' | 'floats';

export interface LostPower {
  readonly actuators: readonly { readonly comes: LossOutcome; readonly from: number; readonly to: number }[];
  /** Shown lines that are under pressure once all has come to rest. */
  readonly under: readonly number[];
  /** The machine as it then stands, its commands as without power. */
  readonly after: Machine;
  readonly end: RunEnd;
}

/** s given to what comes down slowly. */
const LIMIT = 600;
/** m³/s: slower than 1 L/min counts as creeping. */
const CREEP = 1e-3 / 60;

/**
 * Power is lost at this moment, and stays away until all has come to rest: valves with coils go to rest or stay where
 * they were left, levers stay. `speeds`: what moved just before.
 */
export function losePower(
  net: Network,
  machine: Machine,
  speeds: readonly number[],
  loss: Loss,
  budget: Budget,
  shared: Player,
): LostPower {
  const player = new Player(net, machine, budget, shared);
  const positions = net.inputs.map(({ by, rest }, input) =>
    loss.coils && by === 'coil' && rest !== undefined ? rest : (machine.positions[input] ?? 0),
  );
  const result = player.run({
    step: 0,
    positions,
    running: machine.running.map((on) => on && !loss.pumps),
    coils: [],
    travels: [],
    done: () => false,
    limit: LIMIT,
  });
  const { after, time } = { after: player.machine, time: player.time };
  const pumps = after.running.includes(true);
  return {
    actuators: net.actuators.map((actuator, i) => {
      const from = machine.strokes[i] ?? 0;
      const to = after.strokes[i] ?? 0;
      const [motion] = result.ledger.motions.filter((one) => one.actuator === i);
      if (!motion)
        return { comes: player.memory.floats(after, i) && restless(after, i) ? 'floats' : 'holds', from, to };
      if (motion.work <= 0) {
        if (actuator.push.by === 'spring') return { comes: 'moves by spring', from, to };
        const area = Math.max(actuator.areaA, actuator.areaB);
        return { comes: motion.fastest * area < CREEP ? 'creeps' : 'drops', from, to };
      }
      if (!pumps) return { comes: 'moves by stored oil', from, to };
      const was = speeds[i] ?? 0;
      return { comes: was !== 0 && was > 0 === (motion.way === '+') ? 'goes on' : 'starts', from, to };
    }),
    under: player.memory.under(after),
    after: { ...after, running: machine.running },
    end: time >= LIMIT ? { as: 'too long' } : result.end,
  };
}

/** Pressed against a stop it is not free to move both ways. */
const restless = ({ stops }: Machine, actuator: number): boolean => stops[actuator] === 'between';
