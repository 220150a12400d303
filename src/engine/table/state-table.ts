import { countBits, emptySet, has, members, orInto } from '../../base/bits.ts';
import type { LateRows } from './late-rows.ts';
import { strides } from './strides.ts';
import type { Plane, TableData } from './table-data.ts';
import {
  ACTUATOR_NOTES,
  ACTUATOR_VERDICTS,
  BLOCKED_KINDS,
  LINE_CLASSES,
  PUMP_VERDICTS,
  REST_REASONS,
  TRAP_REASONS,
} from './words.ts';
import type {
  ActuatorNote,
  ActuatorVerdict,
  BlockedKind,
  LineClass,
  PumpVerdict,
  RestReason,
  TrapReason,
} from './words.ts';

/** What rows a filter keeps: every field given must match. */
export interface RowFilter {
  /** Input index → positions that are kept. */
  readonly positions?: Readonly<Record<number, readonly number[]>>;
  readonly actuators?: Readonly<Record<number, readonly ActuatorVerdict[]>>;
  readonly pumps?: Readonly<Record<number, readonly PumpVerdict[]>>;
  readonly lines?: Readonly<Record<number, readonly LineClass[]>>;
  /** Only rows in which some line is blocked, trapped for a known reason (not heat alone). */
  readonly trapped?: boolean;
}

/** Rows that are known better than the table has them. */
export interface LateSource {
  of(row: number): LateRows | undefined;
}

/** Reads `TableData` row by row. Rows are 0-based here; people see row + 1. */
export class StateTable {
  readonly data: TableData;
  readonly #strides: readonly number[];
  readonly #late: LateSource | undefined;

  /** `late`: what single rows read instead; counts and `find` go by the table alone. */
  constructor(data: TableData, late?: LateSource) {
    this.data = data;
    this.#late = late;
    this.#strides = strides(data.inputs.map((input) => input.positions.length));
  }

  get count(): number {
    return this.data.count;
  }

  positionsOf(row: number): number[] {
    return this.data.inputs.map((input, i) => Math.floor(row / (this.#strides[i] as number)) % input.positions.length);
  }

  position(input: number, row: number): number {
    const spec = this.data.inputs[input];
    return spec ? Math.floor(row / (this.#strides[input] as number)) % spec.positions.length : 0;
  }

  rowOf(positions: readonly number[]): number {
    return positions.reduce((row, p, i) => row + p * (this.#strides[i] as number), 0);
  }

  /** The row with every sprung valve at rest and every other one in its first position. */
  restRow(): number {
    return this.rowOf(this.data.inputs.map((input) => input.rest ?? 0));
  }

  actuator(index: number, row: number): ActuatorVerdict {
    const late = this.#late?.of(row);
    const word = late
      ? pickBit(late.actuators[index], ACTUATOR_VERDICTS, row)
      : pick(this.data.actuatorPlanes[index], ACTUATOR_VERDICTS, row);
    return word ?? 'undetermined';
  }

  actuatorNotes(index: number, row: number): ActuatorNote[] {
    const late = this.#late?.of(row);
    if (late) return ACTUATOR_NOTES.filter((_, i) => bitOf(late.notes[index]?.[i], row));
    return pickAll(this.data.actuatorNotes[index], ACTUATOR_NOTES, row);
  }

  /** Why open paths leave this actuator to the pressures; empty where they decide. */
  actuatorRests(index: number, row: number): RestReason[] {
    return pickAll(this.data.actuatorRests[index], REST_REASONS, row);
  }

  /** Position of a dependent valve. */
  dependent(index: number, row: number): number {
    const planes = this.data.dependentPlanes[index];
    return Math.max(0, planes?.findIndex((plane) => plane !== undefined && has(plane, row)) ?? 0);
  }

  /** No setting of the dependent valves agrees with the pressures that it causes. */
  hunts(row: number): boolean {
    const { dependentHunts } = this.data;
    return dependentHunts !== undefined && has(dependentHunts, row);
  }

  /** Positions that a dependent valve has in other settings that agree; empty where the row leaves no choice. */
  dependentOthers(index: number, row: number): number[] {
    return (this.data.dependentOthers[index] ?? []).flatMap((plane, p) => (plane && has(plane, row) ? [p] : []));
  }

  /** The row depends on what came before. */
  history(row: number): boolean {
    return this.data.dependents.length > 0 && this.dependentOthers(0, row).length > 0;
  }

  /** Where the valve stands is for pressures that nobody has computed. */
  dependentRests(index: number, row: number): boolean {
    const plane = this.data.dependentRests[index];
    return plane !== undefined && has(plane, row);
  }

  /** Another value could give another verdict; false = it holds for any sensible values. */
  actuatorOnValues(index: number, row: number): boolean {
    const plane = this.data.valuedActuators[index];
    const late = this.#late?.of(row);
    if (late && bitOf(late.valuedActuators[index], row)) return true;
    return (plane !== undefined && has(plane, row)) || this.actuator(index, row) === 'rests on pressure';
  }

  pumpOnValues(index: number, row: number): boolean {
    const plane = this.data.valuedPumps[index];
    const late = this.#late?.of(row);
    if (late && bitOf(late.valuedPumps[index], row)) return true;
    return (plane !== undefined && has(plane, row)) || this.pump(index, row) === 'rests on pressure';
  }

  pump(index: number, row: number): PumpVerdict {
    const late = this.#late?.of(row);
    const word = late
      ? pickBit(late.pumps[index], PUMP_VERDICTS, row)
      : pick(this.data.pumpPlanes[index], PUMP_VERDICTS, row);
    return word ?? 'rests on pressure';
  }

  line(index: number, row: number): LineClass {
    return pick(this.data.linePlanes[index], LINE_CLASSES, row) ?? 'cut off';
  }

  blocked(index: number, row: number): BlockedKind | undefined {
    if (bitOf(this.#late?.of(row)?.flowing[index], row)) return undefined;
    return pick(this.data.blockedPlanes[index], BLOCKED_KINDS, row);
  }

  trapped(index: number, row: number): TrapReason[] {
    if (bitOf(this.#late?.of(row)?.flowing[index], row)) return [];
    return pickAll(this.data.trapPlanes[index], TRAP_REASONS, row);
  }

  /** Verdicts that occur for this actuator, with the number of rows of each. */
  actuatorCounts(index: number): { verdict: ActuatorVerdict; rows: number }[] {
    return counts(this.data.actuatorPlanes[index], ACTUATOR_VERDICTS).map(([verdict, rows]) => ({ verdict, rows }));
  }

  pumpCounts(index: number): { verdict: PumpVerdict; rows: number }[] {
    return counts(this.data.pumpPlanes[index], PUMP_VERDICTS).map(([verdict, rows]) => ({ verdict, rows }));
  }

  /** Rows that pass, in rising order. */
  find(filter: RowFilter): Uint32Array {
    const keep: Plane[] = [];
    const { data } = this;
    const collect = <W>(
      planes: readonly (Plane | undefined)[] | undefined,
      words: readonly W[],
      wanted: readonly W[],
    ): void => {
      const any = emptySet(data.count);
      for (const word of wanted) {
        const plane = planes?.[words.indexOf(word)];
        if (plane) orInto(any, plane);
      }
      keep.push(any);
    };
    for (const [i, wanted] of Object.entries(filter.actuators ?? {}))
      collect(data.actuatorPlanes[Number(i)], ACTUATOR_VERDICTS, wanted);
    for (const [i, wanted] of Object.entries(filter.pumps ?? {}))
      collect(data.pumpPlanes[Number(i)], PUMP_VERDICTS, wanted);
    for (const [i, wanted] of Object.entries(filter.lines ?? {}))
      collect(data.linePlanes[Number(i)], LINE_CLASSES, wanted);
    if (filter.trapped) {
      const any = emptySet(data.count);
      for (const planes of data.trapPlanes) {
        planes.forEach((plane, reason) => {
          if (plane && TRAP_REASONS[reason] !== 'heat') orInto(any, plane);
        });
      }
      keep.push(any);
    }
    const wantedPositions = Object.entries(filter.positions ?? {}).map(
      ([i, list]) => [Number(i), new Set(list)] as const,
    );
    const rows: number[] = [];
    const passes = (row: number): boolean =>
      keep.every((plane) => has(plane, row)) && wantedPositions.every(([i, set]) => set.has(this.position(i, row)));
    const [first] = keep;
    if (first) {
      for (const row of members(first)) if (passes(row)) rows.push(row);
    } else {
      for (let row = 0; row < data.count; row++) if (passes(row)) rows.push(row);
    }
    return Uint32Array.from(rows);
  }
}

const bitOf = (word: number | undefined, row: number): boolean => (((word ?? 0) >>> (row & 31)) & 1) === 1;

function pickBit<W>(bits: readonly number[] | undefined, words: readonly W[], row: number): W | undefined {
  const index = bits?.findIndex((word) => bitOf(word, row)) ?? -1;
  return index < 0 ? undefined : words[index];
}

function pick<W>(planes: readonly (Plane | undefined)[] | undefined, words: readonly W[], row: number): W | undefined {
  const index = planes?.findIndex((plane) => plane !== undefined && has(plane, row)) ?? -1;
  return index < 0 ? undefined : words[index];
}

function pickAll<W>(planes: readonly (Plane | undefined)[] | undefined, words: readonly W[], row: number): W[] {
  return words.filter((_, i) => {
    const plane = planes?.[i];
    return plane !== undefined && has(plane, row);
  });
}

function counts<W>(planes: readonly (Plane | undefined)[] | undefined, words: readonly W[]): [W, number][] {
  return words.flatMap((word, i): [W, number][] => {
    const plane = planes?.[i];
    const rows = plane ? countBits(plane) : 0;
    return rows > 0 ? [[word, rows]] : [];
  });
}
