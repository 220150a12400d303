import type { Circuit } from '../../src/circuit/model.ts';
import { circuit } from '../notation.ts';

/**
 * A panel as somebody might build it, at random: groups of valves in parallel, in series and with carry-over, their
 * supply over checks, throttles and shut-off valves or from the group before; mixed forms; lock checks, throttles
 * and second actuators behind them; loads; and now and then a line across. The same seed gives the same panel.
 */
export function randomPanel(inputs: number, seed: number): Circuit {
  return new Panel(inputs, seed).circuit();
}

const CENTRES = ['shut', 'bypass', 'float', 'float-restricted', 'joined', 'a-t', 'b-t', 'regenerative', 'p-a', 'p-b'];
const CENTRE_WEIGHTS = [8, 4, 6, 2, 2, 1, 2, 2, 1, 1];

class Panel {
  readonly #parts: string[] = [];
  /** Lines under way, by any name: their ports. */
  readonly #lines = new Map<string, string[]>();
  #left: number;
  #made = 0;
  #state: number;

  constructor(inputs: number, seed: number) {
    this.#left = inputs;
    this.#state = seed * 0x9e3779b1 + 0x6d2b79f5;
  }

  circuit(): Circuit {
    this.#part('T1', 'tank');
    this.#join('tank', 'T1.T');
    const pumps = this.#chance(0.25) ? 2 : 1;
    const supplies = Array.from({ length: pumps }, (_, i) => this.#pump(i + 1));
    for (let group = 0; this.#left > 0; group++) {
      const at = group % pumps;
      const supply = supplies[at] as string;
      const size = Math.min(this.#left, 1 + this.#below(7));
      // What comes back may feed the next group.
      const onward = this.#left > size && this.#chance(0.15);
      const back = onward ? this.#name('line') : 'tank';
      const kind = this.#pick(['bank', 'series', 'carry-over', 'checked'], [4, 3, 3, 2]);
      if (kind === 'series') this.#series(this.#branch(supply), back, size);
      else if (kind === 'carry-over') this.#carryOver(this.#branch(supply), back, size);
      else this.#bank(this.#branch(supply), back, size, kind === 'checked');
      if (onward) supplies[at] = back;
    }
    const lines = [...this.#lines.values()].filter((ports) => ports.length > 1).map((ports) => ports.join(' '));
    return { ...circuit([this.#parts.join(', '), ...lines].join(' | ')), name: 'Random panel' };
  }

  /** Mulberry32, public domain: from 0 to below 1. */
  #random(): number {
    this.#state = (this.#state + 0x6d2b79f5) | 0;
    let t = Math.imul(this.#state ^ (this.#state >>> 15), 1 | this.#state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  }

  #below(n: number): number {
    return Math.floor(this.#random() * n);
  }

  #chance(share: number): boolean {
    return this.#random() < share;
  }

  #pick<T>(list: readonly T[], weights: readonly number[]): T {
    let left = this.#random() * weights.reduce((a, b) => a + b, 0);
    const at = weights.findIndex((weight) => (left -= weight) < 0);
    return list[Math.max(0, at)] as T;
  }

  #name(prefix: string): string {
    this.#made += 1;
    return `${prefix}${this.#made}`;
  }

  #part(id: string, kind: string): string {
    this.#parts.push(`${id} ${kind}`);
    return id;
  }

  /** Ports into the line of that name. */
  #join(line: string, ...ports: string[]): void {
    this.#lines.set(line, [...(this.#lines.get(line) ?? []), ...ports]);
  }

  #pump(number: number): string {
    const line = this.#name('line');
    this.#part(`P${number}`, this.#chance(0.3) ? 'compensated-pump' : 'fixed-pump');
    this.#part(`R${number}`, 'relief-valve');
    this.#join(line, `P${number}.P`, `R${number}.P`);
    this.#join('tank', `P${number}.S`, `R${number}.T`);
    return line;
  }

  /** A line from another, over something in between or not. */
  #branch(from: string): string {
    const kind = this.#pick(['none', 'check-valve', 'throttle', 'shut-off-valve'], [6, 2, 1, 1]);
    if (kind === 'none') return from;
    if (kind === 'shut-off-valve') {
      if (this.#left < 2) return from;
      this.#left -= 1;
    }
    return this.#between(kind, from);
  }

  #between(kind: string, from: string): string {
    const id = this.#part(this.#name('N'), kind);
    const line = this.#name('line');
    this.#join(from, `${id}.A`);
    this.#join(line, `${id}.B`);
    return line;
  }

  #bank(supply: string, back: string, size: number, checked: boolean): void {
    let last: readonly string[] = [];
    for (let i = 0; i < size && this.#left > 0; i++) {
      const own = checked ? this.#between('check-valve', supply) : supply;
      const chambers = this.#valve(own, back);
      if (i > 0) this.#across(last, chambers, back);
      last = chambers;
    }
  }

  #series(supply: string, back: string, size: number): void {
    let from = supply;
    let last: readonly string[] = [];
    for (let i = 0; i < size && this.#left > 0; i++) {
      const to = i === size - 1 || this.#left === 1 ? back : this.#name('line');
      const chambers = this.#valve(from, to, this.#chance(0.8) ? 'bypass' : undefined);
      if (i > 0) this.#across(last, chambers, back);
      last = chambers;
      from = to;
    }
  }

  #carryOver(supply: string, back: string, size: number): void {
    let from = supply;
    for (let i = 0; i < size && this.#left > 0; i++) {
      this.#left -= 1;
      const to = i === size - 1 || this.#left === 0 ? back : this.#name('line');
      const id = this.#part(this.#name('V'), 'directional-valve:valve-6/3-carry-over');
      this.#join(from, `${id}.C1`);
      this.#join(to, `${id}.C2`);
      // Sections in parallel, or behind each other where the first in line has the oil.
      this.#join(this.#chance(0.6) ? supply : from, `${id}.P`);
      this.#join(back === 'tank' || this.#chance(0.5) ? 'tank' : back, `${id}.T`);
      this.#actuators(this.#chamber(`${id}.A`), this.#chamber(`${id}.B`));
      from = to;
    }
  }

  /** A valve with what it moves; returns the lines behind it. */
  #valve(supply: string, back: string, centre?: string): readonly string[] {
    this.#left -= 1;
    const form = centre ?? this.#pick([...CENTRES, '4/2', '4/4', '3/2', '2/2'], [...CENTRE_WEIGHTS, 3, 1, 3, 1]);
    const name = {
      '4/2': 'valve-4/2-coil',
      '4/4': 'valve-4/4-float',
      '3/2': 'valve-3/2-coil',
      '2/2': 'valve-2/2-open-coil',
    }[form];
    const id = this.#part(this.#name('V'), `directional-valve:${name ?? `valve-4/3-${form}`}`);
    this.#join(supply, `${id}.P`);
    if (form === '2/2') {
      this.#join(back, `${id}.A`);
      return [];
    }
    this.#join(back, `${id}.T`);
    const a = this.#chamber(`${id}.A`);
    if (form === '3/2') {
      const cylinder = this.#part(this.#name('C'), 'single-acting-cylinder');
      this.#join(a, `${cylinder}.A`);
      return [a];
    }
    const b = this.#chamber(`${id}.B`);
    const [farA, farB] = this.#locked(a, b);
    this.#actuators(farA, farB);
    return [farA, farB];
  }

  /** The line behind a valve's port, over a throttle with a check now and then. */
  #chamber(port: string): string {
    const line = this.#name('line');
    this.#join(line, port);
    if (!this.#chance(0.15)) return line;
    const id = this.#part(this.#name('N'), 'one-way-throttle');
    const far = this.#name('line');
    this.#join(line, `${id}.A`);
    this.#join(far, `${id}.B`);
    return far;
  }

  #locked(a: string, b: string): [string, string] {
    const kind = this.#pick(['none', 'double', 'one'], [8, 1, 1]);
    if (kind === 'none') return [a, b];
    const [farA, farB] = [this.#name('line'), this.#name('line')];
    if (kind === 'double') {
      const id = this.#part(this.#name('N'), 'double-lock-check');
      this.#join(a, `${id}.V1`);
      this.#join(farA, `${id}.C1`);
      this.#join(b, `${id}.V2`);
      this.#join(farB, `${id}.C2`);
      return [farA, farB];
    }
    const id = this.#part(this.#name('N'), 'lock-check');
    this.#join(a, `${id}.V`);
    this.#join(farA, `${id}.C`);
    this.#join(b, `${id}.X`);
    return [farA, b];
  }

  #actuators(a: string, b: string): void {
    const count = this.#chance(0.1) ? 2 : 1;
    for (let i = 0; i < count; i++) {
      const kind = this.#pick(['cylinder', 'motor', 'double-rod-cylinder'], [8, 1, 1]);
      const load =
        kind === 'motor' || this.#chance(0.75)
          ? ''
          : `{loadSense=${this.#chance(0.5) ? 'pushes in' : 'pulls out'};load=5 kN}`;
      const id = this.#part(this.#name('C'), `${kind}${load}`);
      this.#join(a, `${id}.A`);
      this.#join(b, `${id}.B`);
      if (kind === 'motor') this.#join('tank', `${id}.L`);
    }
  }

  /** Now and then a line from one valve's actuator to the next one's, or a check that lets oil in from the return. */
  #across(first: readonly string[], second: readonly string[], back: string): void {
    const from = first[this.#below(first.length)];
    const to = second[this.#below(second.length)];
    if (from === undefined || to === undefined) return;
    const kind = this.#pick(['none', 'shut-off-valve', 'check-valve', 'suction'], [17, 1, 1, 1]);
    if (kind === 'none' || (kind === 'shut-off-valve' && this.#left < 1)) return;
    if (kind === 'shut-off-valve') this.#left -= 1;
    const id = this.#part(this.#name('N'), kind === 'suction' ? 'check-valve' : kind);
    this.#join(kind === 'suction' ? back : from, `${id}.A`);
    this.#join(to, `${id}.B`);
  }
}
