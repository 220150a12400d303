import type { PlanTrace } from '../../worker/client.ts';
import type { MenuItem } from '../ui/menu-item.ts';

const FEW = 3;
/** Pa: what stands lower at all times tells nothing. */
const WORTH = 2e5;

/** Names of the lines with the highest pressures, in the order of the circuit: what a diagram shows unless told otherwise. */
export function diagramLines({ lines, samples }: PlanTrace): readonly string[] {
  const most = lines.map((_, i) => Math.max(0, ...samples.map(({ pressures }) => pressures[i] ?? 0)));
  const ranked = lines.map((_, i) => i).sort((a, b) => (most[b] ?? 0) - (most[a] ?? 0));
  const kept = new Set(ranked.filter((i) => (most[i] ?? 0) >= WORTH).slice(0, FEW));
  return lines.filter((_, i) => kept.has(i));
}

export function lineItems(
  { lines }: PlanTrace,
  shown: readonly string[],
  onchange: (shown: readonly string[]) => void,
): MenuItem[] {
  return [
    { heading: 'Lines whose pressures are drawn' },
    ...lines.map((name) => ({
      text: name,
      on: shown.includes(name),
      run: () => onchange(lines.filter((each) => (each === name ? !shown.includes(name) : shown.includes(each)))),
    })),
  ];
}
