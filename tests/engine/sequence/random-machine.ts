import fc from 'fast-check';
import type { Circuit } from '../../../src/circuit/model.ts';
import { circuit } from '../../notation.ts';

const VALVES = [
  'valve-4/3-shut',
  'valve-4/3-bypass',
  'valve-4/3-float',
  'valve-4/3-joined',
  'valve-4/3-regenerative',
  'valve-4/3-a-t',
];
const BETWEEN = ['none', 'none', 'lock', 'double lock', 'check', 'shut-off', 'throttle'] as const;
const LOADS = ['', '{load=20 kN;loadSense=pushes in}', '{load=8 kN;loadSense=pulls out}'];

interface Branch {
  readonly valve: number;
  readonly between: number;
  readonly load: number;
  readonly single: boolean;
}

const branch: fc.Arbitrary<Branch> = fc.record({
  valve: fc.nat({ max: VALVES.length - 1 }),
  between: fc.nat({ max: BETWEEN.length - 1 }),
  load: fc.nat({ max: LOADS.length - 1 }),
  single: fc.boolean(),
});

/** Circuits that somebody might build, and that hold pressure: valves between a supply and loaded cylinders, at most three inputs. */
export function randomMachine(): fc.Arbitrary<Circuit> {
  return fc
    .tuple(fc.array(branch, { minLength: 1, maxLength: 3 }), fc.boolean(), fc.nat({ max: 3 }), fc.nat({ max: 2 }))
    .map(([branches, tight, store, joined]) => {
      const parts = [`P1 fixed-pump{tightWhenStopped=${String(tight)}}`, 'R1 relief-valve', 'T1 tank'];
      const lines: string[] = [];
      let inputs = 0;
      const supply = ['P1.P', 'R1.P'];
      const tank = ['R1.T', 'T1.T', 'P1.S'];
      if (store > 1) {
        parts.push('ACC1 accumulator');
        supply.push('ACC1.A');
      }
      if (store > 2) {
        parts.push('DV1 shut-off-valve');
        supply.push('DV1.A');
        tank.push('DV1.B');
        inputs += 1;
      }
      branches.forEach(({ valve, between, load, single }, i) => {
        if (inputs === 3) return;
        inputs += 1;
        const n = i + 1;
        parts.push(
          `V${n} directional-valve:${VALVES[valve] ?? ''}`,
          `C${n} ${single ? `single-acting-cylinder${LOADS[load] ?? ''}` : `cylinder${LOADS[load] ?? ''}`}`,
        );
        supply.push(`V${n}.P`);
        tank.push(`V${n}.T`);
        let cap = `V${n}.A`;
        let rod = `V${n}.B`;
        const through = (part: string, from: string, to: string): void => {
          parts.push(`X${n} ${part}`);
          lines.push(`${cap} X${n}.${from}`);
          cap = `X${n}.${to}`;
        };
        switch (BETWEEN[between]) {
          case 'lock':
            through('lock-check', 'V', 'C');
            lines.push(`${rod} X${n}.X`);
            break;
          case 'double lock':
            through('double-lock-check', 'V1', 'C1');
            lines.push(`${rod} X${n}.V2`);
            rod = `X${n}.C2`;
            break;
          case 'check':
            through('check-valve', 'A', 'B');
            break;
          case 'throttle':
            through('throttle', 'A', 'B');
            break;
          case 'shut-off':
            if (inputs === 3) break;
            inputs += 1;
            through('shut-off-valve', 'A', 'B');
            break;
          default:
        }
        lines.push(`${cap} C${n}.A`);
        if (!single) lines.push(`${rod} C${n}.B`);
      });
      // A supply behind a check, or two chambers on one line, now and then.
      if (joined === 1) {
        parts.push('CV1 check-valve');
        lines.push('P1.P R1.P CV1.A', `CV1.B ${supply.slice(2).join(' ')}`);
      } else lines.push(supply.join(' '));
      lines.push(tank.join(' '));
      return circuit(`${parts.join(', ')} | ${lines.join(' | ')}`);
    });
}
