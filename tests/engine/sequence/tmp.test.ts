import { readFileSync } from 'node:fs';
import { test } from 'vitest';
import { networkOf } from '../../../src/analysis/analyse.ts';
import { openCircuit } from '../../../src/parts/open.ts';
import { BleedModel, planBleed } from '../../../src/engine/sequence/bleed.ts';
import { circuit } from '../../notation.ts';
const show = (name: string, c: Parameters<typeof networkOf>[0]) => {
  const net = networkOf(c);
  const model = new BleedModel(net, { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) });
  const L = (l: readonly number[]) => l.map((i) => net.lines[i]?.name).join(',');
  for (let row = 0; row < Math.min(model.states, 12); row++) {
    const t = performance.now();
    const p = planBleed(model, row);
    console.log(name, row + 1, 'start', p.start.map((s) => net.lines[s.line]?.name + ':' + s.reasons.map((r) => r.kind + (r.kind === 'load' ? r.pressure : '')).join('+')).join(' '), '| stop', JSON.stringify(p.stopping), '| moves', p.moves.map((m) => `${net.inputs[m.input]?.part}:${net.inputs[m.input]?.positions[m.from]}>${net.inputs[m.input]?.positions[m.to]} ${JSON.stringify(m.cautions)} vents ${L(m.vents)} held ${L(m.held)}`).join(' ; '), '| left', p.left.map((x) => net.lines[x.line]?.name + (x.never ? '!' : '')).join(','), p.proven, p.states, (performance.now() - t).toFixed(1));
  }
};
test('x', () => {
  show('G21', circuit('P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder{bore=63 mm;rod=45 mm;load=20 kN;loadSense=pushes in}, T1 tank | P: P1.P R1.P V1.P | A: V1.A C1.A | B: V1.B C1.B | T: V1.T R1.T T1.T P1.S'));
  for (const f of ['grain-tipper', 'panel-clamp', 'stacker-bank', 'log-deck', 'net-winch', 'bale-gate', 'infeed-series']) {
    const o = openCircuit(readFileSync(`examples/${f}.spool.json`, 'utf8'));
    if (o.ok) show(f, o.value);
  }
  show('Q7', circuit('P1 fixed-pump{tightWhenStopped=true}, R1 relief-valve, T1 tank, ACC1 accumulator, DV1 shut-off-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder | P: P1.P R1.P ACC1.A DV1.A V1.P | A: V1.A C1.A | B: V1.B C1.B | T: V1.T DV1.B R1.T T1.T P1.S'));
  show('Q7no', circuit('P1 fixed-pump{tightWhenStopped=true}, R1 relief-valve, T1 tank, ACC1 accumulator, V1 directional-valve:valve-4/3-shut, C1 cylinder | P: P1.P R1.P ACC1.A V1.P | A: V1.A C1.A | B: V1.B C1.B | T: V1.T R1.T T1.T P1.S'));
});
