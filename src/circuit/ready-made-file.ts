import { z } from 'zod';
import { bad, good, type Problem, type Result } from '../base/result.ts';
import { parseJson } from './json.ts';
import { LIMITS } from './limits.ts';
import type { Circuit } from './model.ts';
import { quote, shorten } from './problems.ts';
import { fileSchema } from './schema.ts';
import { writeCircuit } from './write.ts';

/** A file of ready-made circuits: whole circuit files in a list, each called by its name. */
export const READY_MADE_FORMAT = 'spooltable-ready-made';

const VERSION = 1;

const schema = z
  .looseObject({
    format: z.literal(READY_MADE_FORMAT),
    version: z.literal(VERSION),
    circuits: z.array(fileSchema).max(LIMITS.readyMadeCircuits),
  })
  .meta({
    title: 'Spooltable ready-made circuits',
    description: 'Circuits to be placed on a sheet as often as wanted, each as in a circuit file.',
  });

/** The file as a JSON Schema (draft 2020-12). */
export const readyMadeSchema = (): Record<string, unknown> => ({
  ...z.toJSONSchema(schema, { io: 'input', target: 'draft-2020-12' }),
});

export function writeReadyMade(circuits: readonly Circuit[]): string {
  const list = circuits.map((circuit) => JSON.parse(writeCircuit(circuit)) as unknown);
  return `${JSON.stringify({ format: READY_MADE_FORMAT, version: VERSION, circuits: list }, undefined, 2)}\n`;
}

/** Whether a text calls itself such a file, right or wrong inside. */
export function isReadyMadeFile(text: string): boolean {
  if (!text.includes(READY_MADE_FORMAT)) return false;
  const parsed = parseJson(text);
  return parsed.ok && field(parsed.value, 'format') === READY_MADE_FORMAT;
}

/**
 * Reads a file of ready-made circuits, or one circuit file as a list of one. `read` checks each circuit as a file of
 * its own. A file with a problem is refused whole.
 */
export function readReadyMade(text: string, read: (text: string) => Result<Circuit>): Result<readonly Circuit[]> {
  const parsed = parseJson(text);
  if (!parsed.ok) return parsed;
  if (field(parsed.value, 'format') !== READY_MADE_FORMAT) {
    const one = read(text);
    return one.ok ? filled([one.value]) : one;
  }
  const version = field(parsed.value, 'version');
  if (version !== VERSION)
    return bad({
      where: 'version',
      what: `The version is ${quote(version)}; this program reads version ${VERSION}.`,
      remedy: 'Save the file with this version of the program, or take a newer program.',
    });
  const list = field(parsed.value, 'circuits');
  if (!Array.isArray(list))
    return bad({ where: 'circuits', what: 'The list of circuits is missing.', remedy: 'Save the file anew.' });
  if (list.length > LIMITS.readyMadeCircuits)
    return bad({
      where: 'circuits',
      what: `The file has ${list.length} circuits; at most ${LIMITS.readyMadeCircuits} can be read.`,
      remedy: 'Split it into several files.',
    });
  const problems: Problem[] = [];
  const circuits = list.flatMap((each: unknown, i): Circuit[] => {
    const one = read(JSON.stringify(each));
    if (one.ok) return [one.value];
    problems.push(...one.problems.map((problem) => ({ ...problem, where: `circuits[${i}] ${problem.where}` })));
    return [];
  });
  return problems.length > 0 ? bad(...shorten(problems)) : filled(circuits);
}

function filled(circuits: readonly Circuit[]): Result<readonly Circuit[]> {
  const empty = circuits.find(({ parts, labels = [] }) => parts.length + labels.length === 0);
  if (circuits.length > 0 && !empty) return good(circuits);
  return bad({
    where: empty ? quote(empty.name) : 'circuits',
    what: empty ? 'The circuit has no part and no text.' : 'The file holds no circuit.',
    remedy: 'Take a file with parts in it.',
  });
}

const field = (value: unknown, name: string): unknown =>
  typeof value === 'object' && value !== null && Object.hasOwn(value, name)
    ? (value as Record<string, unknown>)[name]
    : undefined;
