import type { ValveData } from '../circuit/model.ts';
import { pathsKey } from '../circuit/valve-alike.ts';
import { pathsOf } from './valve-paths.ts';
import type { PartProblem } from './contract.ts';

/** Something about a valve that is being made. `note`: it may well be meant. */
export interface ValveAdvice {
  readonly level: 'error' | 'warning' | 'note';
  /** In words: `position a`, `port T`. */
  readonly where: string;
  readonly what: string;
  readonly remedy: string;
}

const HANDS: readonly string[] = ['lever', 'pedal', 'button', 'hand'];

/** What may be left to do on a valve that can be saved as it is, beyond what `checkValve` finds. */
export function adviseValve(valve: ValveData): ValveAdvice[] {
  return [...portsOf(valve), ...positionsOf(valve), ...operatorsOf(valve), ...crossoversOf(valve)];
}

function portsOf(valve: ValveData): ValveAdvice[] {
  const used = new Set(valve.positions.flatMap((_, i) => pathsOf(valve, i).flatMap(({ ports }) => ports)));
  return valve.ports
    .filter(({ id }) => !used.has(id))
    .map(({ id }) => ({
      level: 'warning',
      where: `port ${id}`,
      what: `Port ${id} is shut in every position.`,
      remedy: 'Draw a path to it, or remove it.',
    }));
}

function positionsOf({ positions }: ValveData): ValveAdvice[] {
  const keys = positions.map(({ paths }) => pathsKey(paths));
  return positions.flatMap((position, i): ValveAdvice[] => {
    const twin = keys.indexOf(keys[i] as string);
    if (twin === i) return [];
    const other = positions[twin]?.name ?? '';
    return [
      {
        level: 'warning',
        where: `position ${position.name}`,
        what: `Position ${position.name} opens the same paths as ${other}.`,
        remedy: 'Draw other paths, or remove one of the two.',
      },
    ];
  });
}

function operatorsOf({ positions, left, right, rest, coils = [] }: ValveData): ValveAdvice[] {
  const operators = [...left, ...right];
  const advice: ValveAdvice[] = [];
  if (rest === undefined && !operators.includes('spring') && !operators.includes('detent')) {
    advice.push({
      level: 'warning',
      where: 'rest',
      what: 'Nothing says where the valve stands when nobody moves it.',
      remedy: 'Add a spring and choose the rest position, or add a detent.',
    });
  }
  if (coils.length > 0 && !operators.some((each) => HANDS.includes(each))) {
    const missed = positions.filter((_, i) => i !== rest && !coils.some((coil) => coil.position === i));
    for (const { name } of missed) {
      advice.push({
        level: 'warning',
        where: `position ${name}`,
        what: `No coil leads to position ${name}, and it is not the rest position.`,
        remedy: 'Bind a coil to it.',
      });
    }
  }
  return advice;
}

function crossoversOf({ positions, crossovers }: ValveData): ValveAdvice[] {
  const known = crossovers?.length ?? 0;
  if (known >= positions.length - 1) return [];
  return [
    {
      level: 'note',
      where: 'crossovers',
      what: known === 0 ? 'What is open while it shifts is not known.' : 'Not every crossover is known.',
      remedy: 'Take it from the data sheet of the valve; until then both shut and joined count as possible.',
    },
  ];
}

/** A problem of a part's check, with its place in the valve in words. */
export function inWords(valve: ValveData, { level, where, what, remedy }: PartProblem): ValveAdvice {
  return { level: level ?? 'error', where: sayPlace(valve, where), what, remedy };
}

function sayPlace({ ports, positions, coils }: ValveData, where: string): string {
  const [, list, index] = /^valve\.(ports|positions|crossovers|coils)\[(\d+)\]/.exec(where) ?? [];
  const at = Number(index);
  if (list === 'ports') return `port ${ports[at]?.id ?? ''}`;
  if (list === 'positions') return `position ${positions[at]?.name ?? ''}`;
  if (list === 'coils') return `coil ${coils?.[at]?.name ?? ''}`;
  if (list === 'crossovers') return `crossover ${positions[at]?.name ?? ''}–${positions[at + 1]?.name ?? ''}`;
  const field = /^valve\.(\w+)/.exec(where)?.[1];
  if (field === 'left' || field === 'right') return 'operators';
  return field ?? (where.startsWith('settings.') ? 'settings' : where);
}
