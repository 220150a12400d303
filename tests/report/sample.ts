import { add, emptySet } from '../../src/base/bits.ts';
import type { Finding } from '../../src/analysis/results.ts';
import type { Circuit, Part } from '../../src/circuit/model.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import type { Plane, TableData, TableInput } from '../../src/engine/table/table-data.ts';
import {
  ACTUATOR_NOTES,
  ACTUATOR_VERDICTS,
  BLOCKED_KINDS,
  LINE_CLASSES,
  PUMP_VERDICTS,
  REST_REASONS,
  TRAP_REASONS,
} from '../../src/engine/table/words.ts';
import type { ReportSource } from '../../src/report/rows.ts';

/** What is said of one actuator, pump or line: a word (or words) for each row. */
type Words = Readonly<Record<string, readonly (string | readonly string[])[]>>;

export interface Sample {
  readonly inputs: readonly Pick<TableInput, 'label' | 'positions' | 'rest' | 'coils'>[];
  readonly actuators?: Words;
  readonly actuatorNotes?: Words;
  readonly actuatorRests?: Words;
  readonly pumps?: Words;
  readonly lines?: Words;
  readonly blocked?: Words;
  readonly trapped?: Words;
  readonly notPermitted?: number;
  readonly commandCombinations?: number;
  readonly pumpsRunning?: boolean;
  /** Actuator or pump → 0-based rows in which its verdict rests on values. */
  readonly valued?: Readonly<Record<string, readonly number[]>>;
}

/** A table written by hand, row by row, for the writers to write. */
export function sampleTable(sample: Sample): StateTable {
  const count = sample.inputs.reduce((product, input) => product * input.positions.length, 1);
  const planes = (
    names: readonly string[],
    said: Words | undefined,
    words: readonly string[],
  ): (Plane | undefined)[][] =>
    names.map((name) =>
      words.map((word) => {
        const plane = emptySet(count);
        said?.[name]?.forEach((is, row) => {
          if ([is].flat().includes(word)) add(plane, row);
        });
        return plane;
      }),
    );
  const actuators = Object.keys(sample.actuators ?? {});
  const pumps = Object.keys(sample.pumps ?? {});
  const lines = Object.keys(sample.lines ?? {});
  const data: TableData = {
    pumpsRunning: sample.pumpsRunning ?? true,
    inputs: sample.inputs.map((input) => ({
      part: `id-${input.label}`,
      by: input.coils.length > 0 ? 'coil' : 'lever',
      ...input,
    })),
    actuators: actuators.map((label) => ({ part: `id-${label}`, label, motion: 'linear' })),
    pumps: pumps.map((label) => ({ part: `id-${label}`, label })),
    lines: lines.map((name) => ({ name, ports: [], connections: [] })),
    count,
    notPermitted: sample.notPermitted ?? 0,
    commandCombinations: sample.commandCombinations ?? 0,
    actuatorPlanes: planes(actuators, sample.actuators, ACTUATOR_VERDICTS),
    actuatorNotes: planes(actuators, sample.actuatorNotes, ACTUATOR_NOTES),
    actuatorRests: planes(actuators, sample.actuatorRests, REST_REASONS),
    pumpPlanes: planes(pumps, sample.pumps, PUMP_VERDICTS),
    linePlanes: planes(lines, sample.lines, LINE_CLASSES),
    blockedPlanes: planes(lines, sample.blocked, BLOCKED_KINDS),
    trapPlanes: planes(lines, sample.trapped, TRAP_REASONS),
    valued: sample.valued ? valuedPlane(Object.values(sample.valued).flat(), count) : undefined,
    valuedActuators: actuators.map((label) => valuedPlane(sample.valued?.[label] ?? [], count)),
    valuedPumps: pumps.map((label) => valuedPlane(sample.valued?.[label] ?? [], count)),
    dependents: [],
    dependentPlanes: [],
    dependentRests: [],
    dependentHunts: undefined,
    dependentOthers: [],
    dependentsSearched: true,
  };
  return new StateTable(data);
}

function valuedPlane(rows: readonly number[], count: number): Plane {
  const plane = emptySet(count);
  for (const row of rows) add(plane, row);
  return plane;
}

export function sampleSource(sample: Sample, more: Partial<ReportSource> = {}): ReportSource {
  const table = sampleTable(sample);
  const { inputs, actuators, pumps } = table.data;
  const parts = [...inputs, ...actuators, ...pumps].map(({ part, label }): Part => ({
    id: part,
    kind: 'junction',
    label,
  }));
  const circuit: Circuit = { name: 'Clamp rig', parts, connections: [] };
  return { version: '9.8.7', circuit, conditions: { pumps: 'running' }, table, findings: [], ...more };
}

/** One valve with two coils, one cylinder, one pump; the figures are invented. */
export const CLAMP: Sample = {
  inputs: [
    {
      label: 'V1',
      positions: ['a', '0', 'b'],
      rest: 1,
      coils: [
        { name: 'Y1', position: 0 },
        { name: 'Y2', position: 2 },
      ],
    },
  ],
  actuators: { CLAMP: ['extends', 'held', 'rests on pressure'] },
  actuatorNotes: { CLAMP: [[], ['void forms'], []] },
  actuatorRests: { CLAMP: [[], [], ['load', 'rivals']] },
  pumps: { P1: ['working', 'over relief', 'working, part over relief'] },
  lines: { L1: ['fed', 'fed', 'fed'], L2: ['fed', 'cut off', 'vented'], L3: ['vented', 'cut off', 'fed'] },
  blocked: { L1: [[], 'under pressure', []], L2: [[], 'cut off', []], L3: [[], 'cut off', []] },
  trapped: { L2: [[], ['left behind', 'heat'], []], L3: [[], ['heat'], []] },
  notPermitted: 1,
  commandCombinations: 4,
};

export const FINDING: Finding = {
  rule: 'pump-over-relief-at-rest',
  level: 'caution',
  title: 'P1 runs over its relief at rest',
  what: 'All its flow turns into heat.',
  remedy: 'Give it a free path to tank at rest.',
  parts: ['id-P1', 'RV9'],
  lines: [0],
  rows: [1],
  rowCount: 1,
};

export const joined = (chunks: Iterable<string>): string => [...chunks].join('');
