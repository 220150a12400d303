import type { Box, Point } from '../base/points.ts';
import { isStripValve } from '../parts/valve-kinds.ts';
import type { Circuit, Part } from '../circuit/model.ts';
import type { Meetings } from './neighbours.ts';
import { meetings, reach } from './neighbours.ts';
import { partReach, placedPorts } from './shapes.ts';

/** Free space between parts, in modules. */
export const SPACE = 4;
/** Between columns there is also room for names and lines; above valves and over the supply for lines. */
const COLUMN_SPACE = 13;
const ROW_SPACE = 5;
const TANK_ROOM = 2 * SPACE;

const ACTUATORS = new Set(['cylinder', 'double-rod-cylinder', 'single-acting-cylinder', 'motor']);
const PUMPS = new Set(['fixed-pump', 'compensated-pump']);
const TANK = 'tank';
const RELIEF = 'relief-valve';

/**
 * Where every part would stand on an empty sheet: one column to a valve, the actuators in a row on
 * top, what lies between stacked over the valve, pumps with what hangs on their line at the bottom.
 * Tanks are left out: they hang under what they drain.
 */
export function planSheet(circuit: Circuit): Map<string, Point> {
  const plan = new Plan(circuit);
  plan.placeColumns();
  plan.placeSupply();
  return plan.at;
}

class Plan {
  readonly at = new Map<string, Point>();
  readonly #parts: ReadonlyMap<string, Part>;
  readonly #all: Meetings;
  readonly #taken = new Set<string>();
  #right = 0;
  #valveBottom = 0;

  constructor(circuit: Circuit) {
    this.#parts = new Map(circuit.parts.map((p) => [p.id, { ...p, at: { x: 0, y: 0 } }]));
    this.#all = meetings(circuit);
  }

  placeColumns(): void {
    const columns = this.#columns();
    // Heights first: all actuators stand on one height above the tallest stack.
    const stackTop = Math.min(
      0,
      ...columns.map((c) => -c.levels.reduce((sum, level) => sum + this.#height(level) + ROW_SPACE, 0)),
    );
    for (const column of columns) {
      const spots = new Map<string, Point>();
      let y = 0;
      if (column.valve) spots.set(column.valve.id, { x: -this.#axis(column.valve), y: 0 - partReach(column.valve).y });
      for (const level of column.levels) {
        y -= ROW_SPACE;
        this.#spread(level, y, spots);
        y -= this.#height(level);
      }
      // A case drain has its tank right below the actuator.
      const drained = column.top.some((p) => placedPorts(p).some((port) => port.role === 'drain'));
      this.#spread(column.top, stackTop - ROW_SPACE - (drained ? TANK_ROOM : 0), spots);
      this.#setColumn(spots);
    }
  }

  /** Pumps from left to right; what the oil passes stands above its pump, what hangs on the line beside it. */
  placeSupply(): void {
    const rest = [...this.#parts.values()].filter((p) => !this.#taken.has(p.id) && p.kind !== TANK);
    const pumps = rest.filter((p) => PUMPS.has(p.kind));
    const groups = pumps.map((pump) => ({ pump, ...this.#hanging(pump) })).sort((a, b) => a.from - b.from);
    const loose = rest.filter((p) => !this.#taken.has(p.id));
    const tallest = Math.max(
      0,
      ...groups.map((g) => this.#height([g.pump]) + g.passed.reduce((sum, p) => sum + this.#height([p]) + SPACE, 0)),
    );
    const floor =
      this.#valveBottom +
      SPACE +
      3 +
      ROW_SPACE +
      Math.max(tallest, this.#height(rest) + (rest.some(hangsUp) ? this.#height(pumps) + SPACE : 0));
    let x = 0;
    const stand = (part: Part, bottom: number): number => {
      const box = partReach(part);
      this.at.set(part.id, { x: Math.round(x - box.x), y: Math.round(bottom - box.y - box.height) });
      return box.width;
    };
    for (const { pump, passed, beside, from } of groups) {
      x = Math.max(x, from);
      let widest = stand(pump, floor);
      let y = floor - this.#height([pump]);
      const axis = (this.at.get(pump.id) as Point).x;
      for (const part of passed) {
        y -= SPACE;
        const box = partReach(part);
        this.at.set(part.id, { x: axis, y: Math.round(y - box.y - box.height) });
        widest = Math.max(widest, axis + box.x + box.width - x);
        y -= box.height;
      }
      x += widest + SPACE + 2;
      for (const part of beside)
        x += stand(part, hangsUp(part) ? floor - this.#height([pump]) - SPACE : floor) + SPACE + 2;
      x += SPACE;
    }
    for (const part of loose) x += stand(part, floor) + SPACE + 2;
  }

  #columns(): Column[] {
    const parts = [...this.#parts.values()];
    const stop = (id: string): boolean => {
      const kind = this.#parts.get(id)?.kind ?? '';
      return isStripValve(kind) || kind === TANK || kind === RELIEF || PUMPS.has(kind) || ACTUATORS.has(kind);
    };
    const valves = parts.filter((p) => isStripValve(p.kind));
    for (const valve of valves) this.#taken.add(valve.id);
    const owners = new Map<string, { column: number; distance: number; through: number }>();
    valves.forEach((valve, column) => {
      const top = (valve.valve?.ports ?? []).filter((p) => p.side === 'top').map((p) => p.id);
      for (const found of reach(this.#all, valve.id, (port) => top.includes(port), stop)) {
        const kind = this.#parts.get(found.part)?.kind ?? '';
        if (isStripValve(kind) || kind === TANK || kind === RELIEF || PUMPS.has(kind)) continue;
        const known = owners.get(found.part);
        if (known && known.distance <= found.distance) continue;
        owners.set(found.part, { column, distance: found.distance, through: top.indexOf(found.through) });
      }
    });
    const columns: Column[] = valves.map((valve) => ({ valve, levels: [], top: [] }));
    for (const part of parts) {
      const owner = owners.get(part.id);
      const column = owner && columns[owner.column];
      if (!owner || !column) continue;
      this.#taken.add(part.id);
      if (ACTUATORS.has(part.kind)) column.top.push(part);
      else (column.levels[owner.distance - 1] ??= []).push(part);
    }
    for (const column of columns) {
      column.levels = Array.from(column.levels, (level) => level ?? []).filter((level) => level.length > 0);
      for (const level of column.levels)
        level.sort((a, b) => (owners.get(a.id)?.through ?? 0) - (owners.get(b.id)?.through ?? 0));
    }
    for (const part of parts) {
      if (!ACTUATORS.has(part.kind) || this.#taken.has(part.id)) continue;
      this.#taken.add(part.id);
      columns.push({ levels: [], top: [part] });
    }
    return columns;
  }

  /** `from`: where the first column begins that the pump feeds. */
  #hanging(pump: Part): { passed: Part[]; beside: Part[]; from: number } {
    this.#taken.add(pump.id);
    const passed: Part[] = [];
    const beside: Part[] = [];
    let from = Infinity;
    const stop = (id: string): boolean =>
      this.#taken.has(id) ||
      isStripValve(this.#parts.get(id)?.kind) ||
      [TANK, RELIEF].includes(this.#parts.get(id)?.kind ?? '');
    for (const found of reach(this.#all, pump.id, () => true, stop)) {
      const part = this.#parts.get(found.part);
      const column = this.at.get(found.part);
      if (part && column) from = Math.min(from, column.x + partReach(part).x);
      if (!part || this.#taken.has(part.id) || part.kind === TANK) continue;
      this.#taken.add(part.id);
      const ways = placedPorts(part).length;
      const suction = found.through === 'S';
      (ways >= 2 && part.kind !== RELIEF && !suction ? passed : beside).push(part);
    }
    return { passed, beside, from: Number.isFinite(from) ? Math.floor(from) : 0 };
  }

  /** Stands the parts side by side about the axis, bottom edges on `bottom`. */
  #spread(parts: readonly Part[], bottom: number, spots: Map<string, Point>): void {
    const boxes = parts.map((p) => partReach(p));
    const total = boxes.reduce((sum, b) => sum + b.width, 0) + SPACE * (parts.length - 1);
    let x = -total / 2;
    parts.forEach((part, i) => {
      const box = boxes[i] as Box;
      const origin = parts.length === 1 ? -this.#axis(part) : x - box.x;
      spots.set(part.id, { x: Math.round(origin), y: Math.round(bottom - box.y - box.height) });
      x += box.width + SPACE;
    });
  }

  #setColumn(spots: ReadonlyMap<string, Point>): void {
    let left = Infinity;
    let right = -Infinity;
    for (const [id, spot] of spots) {
      const box = partReach(this.#parts.get(id) as Part);
      left = Math.min(left, spot.x + box.x);
      right = Math.max(right, spot.x + box.x + box.width);
    }
    if (left > right) return;
    const shift = Math.ceil(this.#right - left);
    for (const [id, spot] of spots) {
      const part = this.#parts.get(id) as Part;
      this.at.set(id, { x: Math.round(spot.x + shift), y: Math.round(spot.y) });
      if (isStripValve(part.kind))
        this.#valveBottom = Math.max(this.#valveBottom, spot.y + partReach(part).y + partReach(part).height);
    }
    this.#right = right + shift + COLUMN_SPACE;
  }

  /** The middle of the ports that face the column: of a valve its upper ones. */
  #axis(part: Part): number {
    const ports = placedPorts(part).filter((p) => p.role !== 'pilot' && p.role !== 'drain');
    const upper = isStripValve(part.kind) ? ports.filter((p) => p.side === 'up') : ports;
    const used = upper.length > 0 ? upper : ports;
    const box = partReach(part);
    return used.length > 0 ? used.reduce((sum, p) => sum + p.at.x, 0) / used.length : box.x + box.width / 2;
  }

  #height(parts: readonly Part[]): number {
    return Math.max(0, ...parts.map((p) => partReach(p).height));
  }
}

/** Its only port looks down: it stands above the line, as gauges and accumulators do. */
function hangsUp(part: Part): boolean {
  const ports = placedPorts(part);
  return ports.length === 1 && ports[0]?.side === 'down';
}

interface Column {
  readonly valve?: Part;
  /** Between valve and actuator, from the valve upwards. */
  levels: Part[][];
  readonly top: Part[];
}
