import fc from 'fast-check';
import { readdirSync, readFileSync } from 'node:fs';
import type { Circuit, Part } from '../../src/circuit/model.ts';
import { hasSheets } from '../../src/circuit/sheets.ts';
import type { PartWords } from '../../src/drawing/labels.ts';
import { faceOf, referencesOf, sheetIds } from '../../src/drawing/faces.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { SUB_CIRCUITS } from '../../src/drawing/sub-circuits.ts';
import { kindOf } from '../../src/parts/catalogue.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { isStripValve } from '../../src/parts/valve-kinds.ts';
import { randomCircuit } from '../random-circuit.ts';

const FOLDER = new URL('../../examples/', import.meta.url);
const ENDING = '.spool.json';

export interface Sheet {
  readonly name: string;
  readonly circuit: Circuit;
}

export const exampleSheets = (): Sheet[] =>
  readdirSync(FOLDER)
    .filter((file) => file.endsWith(ENDING))
    .flatMap((file): Sheet[] => {
      const result = openCircuit(readFileSync(new URL(file, FOLDER), 'utf8'));
      if (!result.ok) throw new Error(`${file}: ${JSON.stringify(result.problems)}`);
      return eachSheet({ name: file.slice(0, -ENDING.length), circuit: placeMissing(result.value) });
    });

/** A circuit of several sheets as these are drawn, one by one. */
function eachSheet({ name, circuit }: Sheet): Sheet[] {
  if (!hasSheets(circuit)) return [{ name, circuit }];
  const references = referencesOf(circuit);
  return sheetIds(circuit).map((sheet) => ({
    name: `${name}, sheet ${sheet}`,
    circuit: faceOf(circuit, sheet, references, () => 'B3'),
  }));
}

export const readyMadeSheets = (): Sheet[] => SUB_CIRCUITS.map(({ id, make }) => ({ name: id, circuit: make() }));

/** The examples again as nobody has placed them: where all stands is left to the sheet. */
export const unplacedSheets = (): Sheet[] =>
  exampleSheets()
    .filter(({ circuit }) => circuit.parts.every(({ kind }) => kindOf(kind)))
    .map(({ name, circuit }) => ({
      name: `${name}, placed anew`,
      circuit: placeMissing({
        ...circuit,
        parts: circuit.parts.map(({ at: _, ...part }): Part => part),
        connections: circuit.connections.map(({ bends: __, ...connection }) => connection),
        labels: [],
      }),
    }));

export const randomSheets = (count: number): Sheet[] =>
  fc.sample(randomCircuit(4, 14), { numRuns: count, seed: 1219 }).map((circuit, i) => ({
    name: `random ${i}`,
    circuit: placeMissing({ ...circuit, parts: circuit.parts.map((part, k) => turned(part, k + i)) }),
  }));

/** Some of them turned and mirrored, with codes. */
const turned = (part: Part, k: number): Part => ({
  ...part,
  ...(k % 5 === 0 && { turn: ([90, 180, 270] as const)[k % 3] ?? 0 }),
  ...(k % 7 === 0 && { flip: true }),
  ...(k % 2 === 0 && { code: `H${k}.1` }),
});

/** As much as a state says of a part as a rule. */
export function stateWords(part: Part): PartWords {
  if (isStripValve(part.kind)) {
    const names = part.valve?.positions.map(({ name }) => name) ?? ['a'];
    return { note: names.reduce((longest, name) => (name.length > longest.length ? name : longest), '') };
  }
  const kind = kindOf(part.kind);
  if (kind?.group === 'Motion') return { note: 'extends', figure: { text: '128 mm/s · 12.4 kN', assumed: true } };
  if (part.kind.endsWith('-pump')) return { note: 'unloaded', figure: { text: '14 bar', assumed: true } };
  return {};
}
