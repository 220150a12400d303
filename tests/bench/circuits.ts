import type { Circuit } from '../../src/circuit/model.ts';
import { circuit } from '../notation.ts';

/** Circuits of any number of valves, for measuring how time and memory grow. */
export type Family = 'BANK' | 'SERIES' | 'SIXWAY' | 'MIX';
export const FAMILIES: readonly Family[] = ['BANK', 'SERIES', 'SIXWAY', 'MIX'];

const MIXED = [
  'valve-4/3-shut',
  'valve-4/3-bypass',
  'valve-4/3-float',
  'valve-4/3-joined',
  'valve-4/3-regenerative',
  'valve-4/3-b-t',
];

export function family(name: Family, valves: number): Circuit {
  const numbers = Array.from({ length: valves }, (_, i) => i + 1);
  const form = (i: number): string => {
    if (name === 'BANK') return 'valve-4/3-shut';
    if (name === 'SERIES') return 'valve-4/3-bypass';
    if (name === 'SIXWAY') return 'valve-6/3-carry-over';
    return MIXED[(i * 7 + 3) % MIXED.length] ?? 'valve-4/3-shut';
  };
  const parts = numbers.map((i) => `V${i} directional-valve:${form(i)}, C${i} cylinder`).join(', ');
  const chambers = numbers.map((i) => `V${i}.A C${i}.A | V${i}.B C${i}.B`).join(' | ');
  const all = (port: string): string => numbers.map((i) => `V${i}.${port}`).join(' ');
  const chain = (from: string, to: string): string =>
    numbers
      .slice(1)
      .map((i) => `V${i - 1}.${from} V${i}.${to}`)
      .join(' | ');
  const lines = {
    BANK: `P1.P R1.P ${all('P')} | ${all('T')} R1.T T1.T P1.S`,
    SERIES: `P1.P R1.P V1.P | ${chain('T', 'P')} | V${valves}.T R1.T T1.T P1.S`,
    SIXWAY: `P1.P R1.P V1.C1 ${all('P')} | ${chain('C2', 'C1')} | V${valves}.C2 ${all('T')} R1.T T1.T P1.S`,
    // Half of them in parallel, half in series behind a throttle.
    MIX: mixLines(valves),
  }[name];
  return circuit(
    `P1 fixed-pump, R1 relief-valve, T1 tank, Q1 throttle, ${parts} | ${chambers} | ${lines.replaceAll('| |', '|')}`,
  );
}

function mixLines(valves: number): string {
  const half = Math.ceil(valves / 2);
  const first = Array.from({ length: half }, (_, i) => i + 1);
  const second = Array.from({ length: valves - half }, (_, i) => half + i + 1);
  const series = second.slice(1).map((i) => `V${i - 1}.T V${i}.P`);
  return [
    `P1.P R1.P Q1.A ${first.map((i) => `V${i}.P`).join(' ')}`,
    ...(second.length > 0
      ? [`Q1.B V${half + 1}.P`, ...series, `V${valves}.T ${first.map((i) => `V${i}.T`).join(' ')} R1.T T1.T P1.S`]
      : [`${first.map((i) => `V${i}.T`).join(' ')} R1.T T1.T P1.S`]),
  ].join(' | ');
}
