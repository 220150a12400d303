import { formatQuantity } from '../base/units.ts';
import type { UnitSystem } from '../base/units.ts';
import { dependentLabel } from '../network/dependents.ts';
import type { NetPath, Network } from '../network/network.ts';
import type { ActuatorVerdict } from '../engine/table/words.ts';
import type { Held } from '../engine/sequence/pressure-state.ts';
import type { Snapshot } from './move-bench.ts';
import type { MoveEffect, MoveNote } from './moves-results.ts';

/** +1 out (A→B), −1 in, 0 at rest or open. */
export function directionOf(verdict: ActuatorVerdict): -1 | 0 | 1 {
  if (/^(extends|turns A→B|moved out|driven A→B)/.test(verdict)) return 1;
  return /^(retracts|turns B→A|moved in|driven B→A)/.test(verdict) ? -1 : 0;
}

const byLoad = (verdict: ActuatorVerdict): boolean => verdict.endsWith('by load');
const bySpring = (verdict: ActuatorVerdict): boolean => verdict.endsWith('by spring');
const isOpen = (verdict: ActuatorVerdict): boolean => verdict === 'undetermined' || verdict === 'rests on pressure';
const BARE = /^(extends|retracts|turns|floats|rests)/;
const say = (verdict: string): string => (BARE.test(verdict) ? verdict : `is ${verdict}`);

/** Puts the difference between snapshots into words. */
export class MoveWords {
  readonly net: Network;
  readonly units: UnitSystem;

  constructor(net: Network, units: UnitSystem) {
    this.net = net;
    this.units = units;
  }

  /** What another state does that this one does not. `most`: Pa by line that can stand before. */
  effects(before: Snapshot, after: Snapshot, most: readonly number[]): MoveEffect[] {
    const { net } = this;
    const found: MoveEffect[] = [];
    net.actuators.forEach(({ part }, i) => {
      const was = before.actuators[i] ?? 'undetermined';
      const is = after.actuators[i] ?? 'undetermined';
      if (was === is) return;
      const text = `${this.#label(part)} ${say(is)} (${was} before).`;
      found.push({ kind: changeOf(was, is), text, lines: [], parts: [this.#id(part)] });
    });
    net.pumps.forEach(({ part }, i) => {
      const [was = '', is = ''] = [before.pumps[i], after.pumps[i]];
      if (was === is) return;
      found.push({
        kind: 'pump',
        text: `${this.#label(part)} is ${is} (${was} before).`,
        lines: [],
        parts: [this.#id(part)],
      });
    });
    net.dependents.forEach(({ part, positions }, i) => {
      const is = after.dependents[i] ?? 0;
      if (before.dependents[i] === is) return;
      const text = `${dependentLabel(net, i)} goes to ${positions[is] ?? ''}.`;
      found.push({ kind: 'valve', text, lines: [], parts: [this.#id(part)] });
    });
    for (let line = 0; line < net.shown; line++) {
      const shut = (at: Snapshot): boolean => at.held.lines[line] === 1 && isShut(at, line);
      if (shut(after) && !shut(before)) found.push(this.#traps(line, before, most));
      if (before.held.lines[line] === 1 && after.held.lines[line] === 0 && after.toTank[line] === 1) {
        found.push({
          kind: 'vents',
          text: `${this.#line(line)} is open to tank and let down.`,
          lines: [line],
          parts: [],
        });
      }
    }
    return found;
  }

  #traps(line: number, before: Snapshot, most: readonly number[]): MoveEffect {
    const stood = before.held.lines[line] === 1 ? most[line] : undefined;
    const bound =
      stood !== undefined && stood > 1e4
        ? `, up to ${formatQuantity(stood, 'pressure', this.units, { digits: 3 })} from before; a load or heat can add to it`
        : '';
    return {
      kind: 'traps',
      text: `${this.#line(line)} is shut in with pressure${bound}.`,
      lines: [line],
      parts: [],
    };
  }

  /**
   * What happens for a moment between two states, and is in neither of them. `paths`: those of the valve that moves.
   * `left`: where pressure would stand after it if it stood as it does during it.
   */
  notes(before: Snapshot, during: Snapshot, after: Snapshot, paths: readonly NetPath[], left: Held): MoveNote[] {
    return [
      ...this.#pumpNotes(before, during, after),
      ...this.#actuatorNotes(before, during, after),
      ...this.#lineNotes(before, during, after, left),
      ...this.#joins(before, during, after, paths),
    ];
  }

  #pumpNotes(before: Snapshot, during: Snapshot, after: Snapshot): MoveNote[] {
    return this.net.pumps.flatMap(({ part }, i): MoveNote[] => {
      const [was, is, comes] = [before.pumps[i], during.pumps[i], after.pumps[i]];
      const note = (kind: 'dead-headed' | 'over relief', text: string): MoveNote[] =>
        was === is || comes === is
          ? []
          : [{ kind, text: `${this.#label(part)} ${text}`, lines: [], parts: [this.#id(part)] }];
      if (is === 'dead-headed') return note(is, 'is dead-headed for a moment: its pressure shoots up.');
      return is === 'over relief' ? note(is, 'goes over a relief valve for a moment.') : [];
    });
  }

  #actuatorNotes(before: Snapshot, during: Snapshot, after: Snapshot): MoveNote[] {
    return this.net.actuators.flatMap(({ part }, i): MoveNote[] => {
      const was = before.actuators[i] ?? 'undetermined';
      const is = during.actuators[i] ?? 'undetermined';
      const comes = after.actuators[i] ?? 'undetermined';
      const label = this.#label(part);
      const note = (kind: MoveNote['kind'], text: string): MoveNote[] => [
        { kind, text, lines: [], parts: [this.#id(part)] },
      ];
      const way = directionOf(is);
      const [from, to] = [directionOf(was), directionOf(comes)];
      if (way !== 0 && way !== from && way !== to) {
        return byLoad(is) || bySpring(is)
          ? note('dips', `${label} dips: it is ${is} for a moment.`)
          : note('jerks', `${label} jerks: it ${is} for a moment.`);
      }
      if (isOpen(is)) {
        return isOpen(was) || isOpen(comes) ? [] : note('open', `Whether ${label} moves for a moment is left open.`);
      }
      if (way === 0 && from !== 0 && from === to) return note('halts', `${label} stops for a moment.`);
      const stands = (verdict: ActuatorVerdict): boolean => directionOf(verdict) === 0 && verdict !== 'floats';
      return is === 'floats' && stands(was) && stands(comes)
        ? note('frees', `Nothing holds ${label} for a moment.`)
        : [];
    });
  }

  #lineNotes(before: Snapshot, during: Snapshot, after: Snapshot, left: Held): MoveNote[] {
    const lists = new Map<MoveNote['kind'], number[]>();
    const put = (kind: MoveNote['kind'], line: number): void => {
      lists.set(kind, [...(lists.get(kind) ?? []), line]);
    };
    for (let line = 0; line < this.net.shown; line++) {
      const [was, is, comes] = [before, during, after].map(({ held }) => held.lines[line] === 1);
      const shut = isShut(after, line);
      if (was && comes && !is) put(shut ? 'let down' : 'lost', line);
      if (was && comes && is && shut && !isShut(before, line)) put('kept', line);
      if (was || !is || comes) continue;
      put(left.lines[line] === 1 && shut ? 'shut in' : 'spreads', line);
    }
    const order = ['let down', 'lost', 'kept', 'spreads', 'shut in'] as const;
    return order.flatMap((kind): MoveNote[] => {
      const lines = lists.get(kind);
      return lines ? [{ kind, text: LINE_TEXTS[kind](this.#names(lines), lines.length > 1), lines, parts: [] }] : [];
    });
  }

  #joins(before: Snapshot, during: Snapshot, after: Snapshot, paths: readonly NetPath[]): MoveNote[] {
    const touched = [...new Set(paths.flatMap(({ from, to }) => [from, to]))].filter(
      (line) => line < this.net.shown && !this.net.lines[line]?.tank,
    );
    const groups = new Map<number, number[]>();
    for (const line of touched) {
      const group = during.groups[line] as number;
      groups.set(group, [...(groups.get(group) ?? []), line]);
    }
    return [...groups.values()].flatMap((lines): MoveNote[] => {
      const together = ({ groups: at }: Snapshot, a: number, b: number): boolean => at[a] === at[b];
      const fresh = lines.some((a, i) =>
        lines.slice(i + 1).some((b) => !together(before, a, b) && !together(after, a, b)),
      );
      if (!fresh) return [];
      const sorted = [...lines].sort((a, b) => a - b);
      return [{ kind: 'joined', text: `${this.#names(sorted)} are joined for a moment.`, lines: sorted, parts: [] }];
    });
  }

  #line = (line: number): string => this.net.lines[line]?.name ?? '';
  #label = (part: number): string => this.net.parts[part]?.label ?? '';
  #id = (part: number): string => this.net.parts[part]?.id ?? '';

  #names(lines: readonly number[]): string {
    const names = lines.map(this.#line);
    return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1) ?? ''}`;
  }
}

const LINE_TEXTS = {
  lost: (names: string, several: boolean) => `${names} ${several ? 'lose their' : 'loses its'} pressure for a moment.`,
  'let down': (names: string, several: boolean) =>
    `${names} ${several ? 'open' : 'opens'} to tank on the way. Do not count on it: a quick move leaves pressure behind.`,
  kept: (names: string, several: boolean) =>
    `${names} ${several ? 'keep their' : 'keeps its'} pressure: nothing lets it down on the way.`,
  spreads: (names: string) => `Pressure gets into ${names} for a moment.`,
  'shut in': (names: string) => `Pressure gets into ${names} on the way and stays shut in there.`,
} as const;

/** Nothing feeds it, nothing lets it down, and no actuator pushes oil through it. */
const isShut = (at: Snapshot, line: number): boolean => at.classes[line] === 'cut off';

function changeOf(was: ActuatorVerdict, is: ActuatorVerdict): MoveEffect['kind'] {
  const [from, to] = [directionOf(was), directionOf(is)];
  if (byLoad(is)) return 'drops';
  if (bySpring(is)) return 'springs';
  if (from === 0 && to !== 0) return 'starts';
  if (from !== 0 && to === 0) return isOpen(is) ? 'changes' : 'stops';
  if (from !== to) return 'turns round';
  return is === 'floats' ? 'lets go' : 'changes';
}
