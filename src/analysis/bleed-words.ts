import { formatQuantity } from '../base/units.ts';
import type { Circuit } from '../circuit/model.ts';
import type { HeldReason } from '../engine/sequence/bleed-start.ts';
import type { MoveCaution } from '../engine/sequence/cautions.ts';
import type { NetActuator, Network } from '../network/network.ts';
import { kindOf } from '../parts/catalogue.ts';
import type { BleedCaution, BleedLine, HeldLine, LeftLine } from './bleed-results.ts';

/** Puts the engine's bleed-down answers into words. */
export class BleedWords {
  readonly net: Network;
  /** Line → labels of what measures on it. */
  readonly #measures: ReadonlyMap<number, readonly string[]>;

  constructor(net: Network, circuit: Circuit) {
    this.net = net;
    this.#measures = measuresOf(net, circuit);
  }

  line(line: number): BleedLine {
    return { line, name: this.net.lines[line]?.name ?? '', measure: this.#measures.get(line) ?? [] };
  }

  lines(list: readonly number[]): BleedLine[] {
    return list.map((line) => this.line(line));
  }

  names(list: readonly number[]): string {
    return list.map((line) => this.net.lines[line]?.name ?? '').join(', ');
  }

  label(part: number | undefined): string {
    return this.net.parts[part ?? -1]?.label ?? '';
  }

  id(part: number | undefined): string {
    return this.net.parts[part ?? -1]?.id ?? '';
  }

  position(input: number, position: number): string {
    return this.net.inputs[input]?.positions[position] ?? '';
  }

  held(line: number, reasons: readonly HeldReason[]): HeldLine {
    return {
      ...this.line(line),
      reasons: reasons.map((reason) => ({ kind: reason.kind, text: this.#reason(reason) })),
    };
  }

  left(line: number, never: boolean): LeftLine {
    return { ...this.line(line), never, remedy: this.#remedy(line, never) };
  }

  caution(caution: MoveCaution): BleedCaution {
    const say = (text: string, part?: number, lines: readonly number[] = []): BleedCaution => ({
      kind: caution.kind,
      text,
      lines,
      parts: part === undefined ? [] : [this.id(part)],
    });
    switch (caution.kind) {
      case 'drop': {
        const actuator = this.net.actuators[caution.actuator];
        const pace = caution.slow ? ' It sinks only as fast as oil leaks back through the stopped pump.' : '';
        const what = caution.by === 'spring' ? 'the spring' : `the load${sizeOf(actuator)}`;
        return say(
          `${this.label(actuator?.part)} comes down: ${what} moves it ${wayOf(actuator, caution.way)}.${pace} Support or restrain it and clear the area first.`,
          actuator?.part,
        );
      }
      case 'driven': {
        const actuator = this.net.actuators[caution.actuator];
        return say(
          `${this.label(actuator?.part)} can move ${wayOf(actuator, caution.way)}, driven by stored oil. Clear the area first.`,
          actuator?.part,
        );
      }
      case 'discharge': {
        const store = this.net.accumulators[caution.accumulator];
        return say(`${this.label(store?.part)} discharges.`, store?.part, store ? [store.line] : []);
      }
      case 'leak':
        return say(
          `${this.names(caution.lines)}: down only slowly, through the leakage of the stopped pump. Wait, and watch the pressure.`,
          undefined,
          caution.lines,
        );
      case 'spread':
        return say(
          `Pressure spreads into ${this.names(caution.lines)}; what stands on ${caution.lines.length > 1 ? 'these lines' : 'this line'} can move.`,
          undefined,
          caution.lines,
        );
      case 'coil': {
        const part = this.net.inputs[caution.input]?.part;
        return say(
          `${this.label(part)} is moved by a coil: it needs the control voltage while the pump drive stays locked off, and goes back without it.`,
          part,
        );
      }
      case 'coupling': {
        const part = this.net.inputs[caution.input]?.part;
        return say(`${this.label(part)} has pressure on it: a coupling is not parted or joined under pressure.`, part);
      }
    }
  }

  #reason(reason: HeldReason): string {
    switch (reason.kind) {
      case 'load': {
        const actuator = this.net.actuators[reason.actuator];
        const by = actuator?.push.by === 'spring' ? 'the spring' : 'the load';
        const size =
          reason.pressure === undefined
            ? ''
            : `: ${formatQuantity(reason.pressure, 'pressure', 'metric', { digits: 3 })} (F/A)`;
        return `Pressed on by ${by} of ${this.label(actuator?.part)}${size}.`;
      }
      case 'stopped':
        return 'Under pressure while the pumps run; stopping them does not let it down.';
      case 'left behind': {
        const { input, from, row } = reason;
        return `Left behind by ${this.label(this.net.inputs[input]?.part)} when it came from ${this.position(input, from)} (row ${row + 1}).`;
      }
      case 'stored':
        return `Kept up by ${this.label(this.net.accumulators[reason.accumulator]?.part)}.`;
      case 'joined':
        return 'Gets it from a line that is open to it, or through a piston.';
    }
  }

  /** Common practice; the machine's documents and local codes go before it. */
  #remedy(line: number, never: boolean): string {
    const ports = this.net.lines[line]?.ports ?? [];
    const kinds = ports.map((port) => {
      const [part = '', name = ''] = port.split('.');
      return { kind: this.net.parts.find(({ id }) => id === part)?.kind ?? '', port: name };
    });
    if (kinds.some(({ kind }) => kind === 'accumulator')) {
      return 'Usually added: a valve that discharges the accumulator when power goes, or hand valves to isolate and to discharge it, and a warning on the machine and the diagram (ISO 4413, paraphrased).';
    }
    if (kinds.some(({ kind, port }) => kind.endsWith('lock-check') && port.startsWith('C'))) {
      return 'Usually added: a bleed valve by hand to tank between the lock check and the actuator, or a lock check that can be released by hand. The load is supported first.';
    }
    return never
      ? 'Usually added: a bleed valve by hand to tank, or a test point with a hose to tank.'
      : 'A lever opens it to tank, but no list of moves lets it down together with the rest. Usually added: a bleed valve by hand to tank, or a test point with a hose to tank.';
  }
}

function wayOf(actuator: NetActuator | undefined, way: 'in' | 'out'): string {
  if (actuator?.rotary) return way === 'in' ? 'from B to A' : 'from A to B';
  return way;
}

function sizeOf(actuator: NetActuator | undefined): string {
  const size = actuator?.push.by === 'load' ? actuator.push.size : 0;
  if (size <= 0) return '';
  const text = actuator?.rotary
    ? formatQuantity(size, 'torque', 'metric', { digits: 3 })
    : formatQuantity(size, 'force', 'metric', { digits: 3 });
  return ` (${text})`;
}

function measuresOf(net: Network, circuit: Circuit): Map<number, string[]> {
  const found = new Map<number, string[]>();
  circuit.parts.forEach((part, index) => {
    for (const port of kindOf(part.kind)?.ports(part) ?? []) {
      const line = net.lineOf.get(`${part.id}.${port.id}`);
      if (port.role !== 'measure' || line === undefined || line >= net.shown) continue;
      found.set(line, [...(found.get(line) ?? []), net.parts[index]?.label ?? part.id]);
    }
  });
  return found;
}
