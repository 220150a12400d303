import { NEAR_IDEAL } from '../../../src/engine/flow/laws.ts';
import { TANK } from '../../../src/engine/flow/problem.ts';
import type { Branch, FlowProblem } from '../../../src/engine/flow/problem.ts';
import { BAR, LPM } from './random-circuit.ts';

/**
 * A pilot-free problem as a netlist of a general circuit simulator: lines are nodes, bar are volts, L/min are
 * amperes, the tank is ground. Every branch becomes two current sources that follow its law.
 */
export function netlist(problem: FlowProblem): string {
  const cards = ['* steady state of a hydraulic circuit: volts are bar, amperes are L/min'];
  const node = (line: number): string => (line === TANK ? '0' : `l${line}`);
  problem.lines.forEach((_, i) => {
    cards.push(`Rleak${i} ${node(i)} 0 ${number(LPM / (problem.leak * BAR))}`);
    cards.push(`Bvoid${i} ${node(i)} 0 I=min(V(${node(i)}),0)/${number((NEAR_IDEAL.void * LPM) / BAR)}`);
  });
  problem.pumps.forEach((pump, i) => cards.push(`Ipump${i} 0 ${node(pump.line)} DC ${number(pump.flow / LPM)}`));
  problem.branches.forEach((branch, j) => {
    if (!branch.on) return;
    const drive = [
      ...(branch.a === TANK ? [] : [`(${number(branch.ca * BAR)})*V(${node(branch.a)})`]),
      ...(branch.b === TANK ? [] : [`(${number(branch.cb * BAR)})*V(${node(branch.b)})`]),
    ].join('+');
    const through = law(branch, `(${drive || '0'})`);
    if (branch.a !== TANK) cards.push(`Ba${j} ${node(branch.a)} 0 I=(${number(branch.ca / LPM)})*(${through})`);
    if (branch.b !== TANK) cards.push(`Bb${j} ${node(branch.b)} 0 I=(${number(branch.cb / LPM)})*(${through})`);
  });
  return [
    ...cards,
    '.options reltol=1e-7 vntol=1e-6 abstol=1e-7 gmin=1e-15 itl1=300',
    '.control',
    'set numdgt=10',
    'op',
    ...problem.lines.map((_, i) => `print v(${node(i)})`),
    'quit',
    '.endc',
    '.end',
    '',
  ].join('\n');
}

const number = (value: number): string => value.toExponential(12);

/** Through-put at a drive, in SI, as an expression. */
function law({ forward, backward, r, k, lo, hi }: Branch, drive: string): string {
  const piece = (excess: string): string => {
    const t = `max(${excess},0)`;
    return k === 0 ? `${t}/${number(r)}` : `2*${t}/(${number(r)}+sqrt(${number(r * r)}+${number(4 * k)}*${t}))`;
  };
  const forth = hi > 0 ? piece(`${drive}-(${number(forward)})`) : '0';
  const back = lo < 0 ? piece(`(${number(backward)})-${drive}`) : '0';
  const held = Number.isFinite(hi) && hi > 0 ? `min(${forth},${number(hi)})` : forth;
  return `${held}-(${Number.isFinite(lo) && lo < 0 ? `min(${back},${number(-lo)})` : back})`;
}

/** Bar per line, read from what the simulator printed; undefined where it found no operating point. */
export function readVolts(text: string, lines: number): number[] | undefined {
  const out = Array.from({ length: lines }, (_, i) =>
    Number(new RegExp(`^v\\(l${i}\\) = (\\S+)`, 'm').exec(text)?.[1]),
  );
  return out.every((value) => Number.isFinite(value)) ? out : undefined;
}
