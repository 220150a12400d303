import type { ValveData } from '../circuit/model.ts';
import { pathsKey } from '../circuit/valve-alike.ts';
import { pathsIn, type BoxRef } from '../circuit/valve-box.ts';
import { parsePath } from '../circuit/valve-path.ts';
import { CENTRES } from './valve-forms.ts';

/** What a box often holds, by its trade name. */
export interface Preset {
  readonly id: string;
  readonly title: string;
  readonly paths: readonly string[];
}

const ENDS: readonly Preset[] = [
  { id: 'pa-bt', title: 'P–A, B–T', paths: ['P-A', 'B-T'] },
  { id: 'pb-at', title: 'P–B, A–T', paths: ['P-B', 'A-T'] },
  { id: 'carry-over', title: 'carry-over (C1–C2), others shut', paths: ['C1-C2'] },
];

/** The usual fillings that a valve has the ports for. */
export function presetsFor({ ports }: Pick<ValveData, 'ports'>): Preset[] {
  const known = new Set(ports.map(({ id }) => id));
  const all: Preset = { id: 'joined', title: 'all ports joined', paths: [ports.map(({ id }) => id).join('-')] };
  return [...CENTRES.map((each) => (each.id === 'joined' ? all : each)), ...ENDS].filter(({ paths }) =>
    paths.every((text) => {
      const path = parsePath(text);
      return path.ok && path.value.ports.every((id) => known.has(id));
    }),
  );
}

/** The usual filling that a box holds; undefined = none of them. */
export function presetOf(valve: ValveData, box: BoxRef): Preset | undefined {
  const key = pathsKey(pathsIn(valve, box));
  return presetsFor(valve).find(({ paths }) => pathsKey(paths) === key);
}
