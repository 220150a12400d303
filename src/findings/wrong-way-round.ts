import { lineEver, lineRows, witnesses } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/**
 * A check that pressure only ever shuts, because nothing feeds or vents the line before it while the line behind
 * it is fed; and a one-way throttle that lets a load down through its check.
 */
export const wrongWayRound: Rule = ({ net, table }) =>
  net.paths.flatMap((path): Finding[] => {
    const part = net.parts[path.part];
    if (!part || !path.oneWay || path.from >= net.shown || path.to >= net.shown || path.from === path.to) return [];
    const base = { rule: 'wrong-way-round', level: 'caution' as const, parts: [part.id], lines: [path.from, path.to] };
    if (part.kind === 'check-valve') {
      if (net.lines[path.from]?.tank) return [];
      if (lineEver(table, path.from, 'fed', 'flows to tank', 'vented', 'carries displaced oil')) return [];
      if (!lineEver(table, path.to, 'fed')) return [];
      // A line that a cylinder stands on may be emptied through it by its load.
      if (net.actuators.some(({ a, b }) => a === path.from || b === path.from)) return [];
      return [
        {
          ...base,
          title: `${part.label} stands the wrong way round`,
          what: `It lets oil on from ${net.lines[path.from]?.name ?? ''}, into which nothing ever leads, and holds back the oil of ${net.lines[path.to]?.name ?? ''}, which is fed. So nothing passes it in any row.`,
          remedy: 'Turn it round: oil passes from A to B.',
          ...witnesses(lineRows(table, path.to, 'fed')),
        },
      ];
    }
    if (part.kind !== 'one-way-throttle') return [];
    return net.actuators.flatMap((actuator, i): Finding[] => {
      const { way, by } = actuator.push;
      const loaded = way === 'in' ? actuator.a : way === 'out' ? actuator.b : -1;
      if (by !== 'load' || loaded !== path.from) return [];
      // It does no harm where something else meters the same side.
      const metered = net.paths.some(
        (other) => other.part !== path.part && other.throttled && (other.from === path.to || other.to === path.to),
      );
      if (metered || net.valves.some(({ from }) => from === loaded)) return [];
      const label = net.parts[net.actuators[i]?.part ?? -1]?.label ?? '';
      return [
        {
          ...base,
          title: `${part.label} lets the load of ${label} down freely`,
          what: `Its check is free from ${net.lines[path.from]?.name ?? ''} on, which the load presses on; it throttles only what goes in, where the pump does not need it.`,
          remedy: 'Usual remedy: turn it round, so that it throttles what the load pushes out.',
          rows: [],
          rowCount: 0,
        },
      ];
    });
  });
