import fc from 'fast-check';
import { networkOf } from '../../../../src/analysis/analyse.ts';
import type { Circuit, Connection, Part } from '../../../../src/circuit/model.ts';
import { kindOf } from '../../../../src/parts/catalogue.ts';

const KINDS = [
  'pilot-valve',
  'two-stage-valve',
  'cylinder',
  'pilot-valve',
  'check-valve',
  'directional-valve',
  'throttle',
];
/** Hubs of lines: supply, return, and four others. */
const HUBS = ['SUPPLY', 'RETURN', 'L1', 'L2', 'L3', 'L4'];

/** Valves near enough to sense: P mostly on the supply, T mostly on the return, all else where it falls. */
export const pilotedCircuits: fc.Arbitrary<Circuit> = fc
  .tuple(
    fc.array(fc.tuple(fc.nat({ max: KINDS.length - 1 }), fc.nat(), fc.boolean()), { minLength: 3, maxLength: 6 }),
    fc.array(fc.nat({ max: 99 }), { minLength: 40, maxLength: 40 }),
  )
  .map(([picks, draws]) => {
    const parts: Part[] = [
      { id: 'PUMP', kind: 'fixed-pump' },
      { id: 'RELIEF', kind: 'relief-valve' },
      { id: 'TANK', kind: 'tank' },
      ...HUBS.map((id): Part => ({ id, kind: 'junction' })),
    ];
    const connections: Connection[] = [];
    const wire = (part: string, port: string, hub: string | undefined): void => {
      if (hub === undefined) return;
      const id = `c${connections.length}`;
      connections.push({ id, from: { part, port }, to: { part: hub, port: 'J' } });
    };
    wire('PUMP', 'P', 'SUPPLY');
    wire('RELIEF', 'P', 'SUPPLY');
    wire('RELIEF', 'T', 'RETURN');
    wire('TANK', 'T', 'RETURN');
    let drawn = 0;
    picks.forEach(([pick, form, loaded], i) => {
      const kind = kindOf(KINDS[i === 0 ? 0 : pick] as string);
      if (!kind) throw new Error('no such kind');
      const made = kind.readyMade[form % kind.readyMade.length]?.make();
      const load = kind.kind === 'cylinder' && loaded ? { load: '6 kN', loadSense: 'resisting' } : {};
      const part: Part = { id: `N${i}`, kind: kind.kind, ...made, settings: { ...made?.settings, ...load } };
      parts.push(part);
      for (const { id } of kind.ports(part)) {
        const draw = draws[drawn++ % draws.length] as number;
        const likely = id === 'P' ? 0 : id === 'T' ? 1 : -1;
        wire(part.id, id, likely >= 0 && draw < 70 ? HUBS[likely] : HUBS[draw % 7]);
      }
    });
    return { name: 'random', parts, connections };
  })
  .filter((circuit) => {
    const { dependents, inputs } = networkOf(circuit);
    const settings = dependents.reduce((n, valve) => n * valve.positions.length, 1);
    const rows = inputs.reduce((n, input) => n * input.positions.length, 1);
    return dependents.length > 0 && settings <= 27 && rows <= 27;
  });
