import type { NetPump } from '../../network/network.ts';
import type { PumpAnswer } from './answers.ts';
import { findWay } from './one-state.ts';
import type { OneState } from './one-state.ts';
import { pumpOutcome } from './pump-outcomes.ts';
import { enclosing, lineName, partId, partLabel, step, waySteps } from './reasons.ts';
import { PUMP_VERDICTS } from './words.ts';

export function explainPump(state: OneState, index: number, pump: NetPump): PumpAnswer {
  const { net } = state;
  const planes = pumpOutcome(index, pump, net, state.block, state.conditions);
  const verdict = PUMP_VERDICTS.find((_, i) => state.is(planes[i])) ?? 'rests on pressure';
  const me = partId(state, pump.part);
  const base = { part: me, label: partLabel(state, pump.part), verdict, onValues: verdict === 'rests on pressure' };
  const outlet = lineName(state, pump.outlet);
  switch (verdict) {
    case 'unloaded': {
      const way = findWay(
        state,
        [pump.outlet],
        (line) => net.lines[line]?.tank === true,
        (line) => state.on(state.block.reach.freeToTank, line),
      );
      return {
        ...base,
        steps: [step(`${outlet} is freely open to tank.`, [pump.outlet], [me]), ...(way ? waySteps(state, way) : [])],
      };
    }
    case 'working':
      return {
        ...base,
        steps: [
          step(
            `${drivenBy(state, index).join(' and ')} ${drivenBy(state, index).length > 1 ? 'take' : 'takes'} its flow.`,
            [pump.outlet],
            [me],
          ),
        ],
      };
    case 'over relief': {
      const relief = net.reliefs.find(
        (entry) => findWay(state, [pump.outlet], (line) => line === entry.from) !== undefined,
      );
      const name = relief ? partLabel(state, relief.part) : 'a pressure valve';
      return {
        ...base,
        steps: [
          step(`${outlet} has no open path to tank, and nothing moves.`, [pump.outlet], [me]),
          step(
            `All flow goes over ${name}: pressure stands at its setting and turns to heat.`,
            relief ? [relief.from, relief.to] : [],
            relief ? [partId(state, relief.part)] : [],
          ),
        ],
      };
    }
    case 'destroked':
      return {
        ...base,
        steps: [
          step(
            `${outlet} has no open path to tank, and nothing moves: the compensator takes the flow back and holds its setting.`,
            [pump.outlet],
            [me],
          ),
        ],
      };
    case 'dead-headed': {
      const wall = enclosing(state, pump.outlet, pump.part);
      return {
        ...base,
        steps: [
          wall,
          step(
            'No pressure valve is within reach: a fixed pump with nowhere to go bursts what is weakest. Fit a relief valve that nothing can shut off.',
            [pump.outlet],
            [me],
          ),
        ],
      };
    }
    case 'stopped':
      return {
        ...base,
        steps: [
          step(
            pump.atRest
              ? 'Nobody works it: its checks let nothing back.'
              : pump.tightWhenStopped
                ? 'It is stopped and set as tight: it lets nothing back.'
                : 'It is stopped: its outlet line comes down slowly through its own leakage.',
            [pump.outlet],
            [me],
          ),
        ],
      };
    default: {
      const driven = drivenBy(state, index);
      const why =
        driven.length > 0
          ? `${driven.join(' and ')} can take its flow; how much of it, and what goes over a pressure valve, depends on loads and throttles.`
          : `${outlet} is open to tank through a throttle only: what passes there, and what goes over a pressure valve, depends on its setting.`;
      return {
        ...base,
        rests: {
          why,
          candidates:
            driven.length > 0 ? ['working', 'working, part over relief', 'over relief'] : ['unloaded', 'over relief'],
        },
        steps: [step(why, [pump.outlet], [me])],
      };
    }
  }
}

/** Labels of the actuators that this pump may move in this state. */
function drivenBy(state: OneState, index: number): string[] {
  const { motion, reach } = state.block;
  const pressed = reach.pressed[index];
  if (!pressed) return [];
  return state.net.actuators.flatMap((actuator, i) => {
    const out = state.is(motion.out[i]) && state.on(pressed, actuator.a);
    const inward = state.is(motion.in[i]) && state.on(pressed, actuator.b);
    return out || inward ? [partLabel(state, actuator.part)] : [];
  });
}
