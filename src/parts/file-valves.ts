import type { Circuit, Part, ReadyMadeValve } from '../circuit/model.ts';
import { kindOf, type CatalogueEntry } from './catalogue.ts';
import type { PartProblem } from './contract.ts';
import { isStripValve } from './valve-kinds.ts';

const PREFIX = 'file ';

/** What a ready-made valve of a file is called where those of the catalogue have their ids. */
export const fileValveId = (id: string): string => PREFIX + id;

/** And back; undefined = it is none. */
export const fileValveOf = (formId: string): string | undefined =>
  formId.startsWith(PREFIX) ? formId.slice(PREFIX.length) : undefined;

export const kindOfReady = ({ kind = 'directional-valve' }: Pick<ReadyMadeValve, 'kind'>): string => kind;

const WORDS = ['own', 'ready-made', 'this circuit'];

/** The ready-made valves of a circuit in the shape of the catalogue's; those of an unknown kind are left out. */
export function fileValveEntries({ readyMadeValves = [] }: Circuit): CatalogueEntry[] {
  return readyMadeValves.flatMap((ready) => {
    const kind = kindOf(kindOfReady(ready));
    if (!kind || !isStripValve(kind.kind)) return [];
    const { id, title, valve } = ready;
    return [
      {
        kind,
        readyMade: { id: fileValveId(id), title, words: WORDS, make: () => ({ valve: structuredClone(valve) }) },
      },
    ];
  });
}

/** What is wrong with the ready-made valves of a circuit; `where` is a path in the file. */
export function checkReadyValves({ readyMadeValves = [] }: Circuit): PartProblem[] {
  return readyMadeValves.flatMap((ready, index): PartProblem[] => {
    const at = `readyMadeValves[${index}]`;
    const kind = kindOf(kindOfReady(ready));
    if (!kind || !isStripValve(kind.kind)) {
      return [
        {
          level: 'warning',
          where: `${at}.kind`,
          what: `Ready-made valve "${ready.title}": "${ready.kind}" is no kind of directional valve.`,
          remedy: 'It is kept, but cannot be placed.',
        },
      ];
    }
    const sample: Part = { id: ready.id, kind: kind.kind, valve: ready.valve };
    return (kind.check?.(sample) ?? []).map((problem) => ({
      ...problem,
      where: `${at}.${problem.where}`,
      what: `Ready-made valve "${ready.title}": ${problem.what}`,
    }));
  });
}
