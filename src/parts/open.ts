import { bad, good, type Problem, type Result } from '../base/result.ts';
import { omit } from '../circuit/fields.ts';
import { readCircuit } from '../circuit/file.ts';
import type { Circuit, Part } from '../circuit/model.ts';
import { quote, shorten } from '../circuit/problems.ts';
import { kindOf, readyMadeOf } from './catalogue.ts';
import { checkParts } from './check.ts';

const SHORTHAND = 'readyMade';

/**
 * Read a file and check every part, setting and port in it. A file with a problem is refused whole.
 *
 * A part may say `"readyMade": "valve-4/3-shut"` instead of giving valve data and settings: it then starts as that
 * form of its kind, its own settings and valve data come first, and the word is not written back.
 */
export function openCircuit(text: string): Result<Circuit> {
  const read = readCircuit(text);
  if (!read.ok) return read;
  const problems: Problem[] = [];
  const notes: Problem[] = [];
  const parts = read.value.parts.map((part, i) => expand(part, `parts[${i}].${SHORTHAND}`, problems, notes));
  const circuit = notes.length === 0 ? read.value : { ...read.value, parts };
  // What stands on a part with a wrong shorthand is not worth telling: its valve data are not there.
  const found = problems.length > 0 ? [] : checkParts(circuit);
  const plain = ({ where, what, remedy }: Problem): Problem => ({ where, what, remedy });
  problems.push(...found.filter((problem) => problem.level === 'error').map(plain));
  if (problems.length > 0) return bad(...shorten(problems));
  const expanded = new Set(notes.map((note) => note.where));
  const told = new Set(read.warnings.map((warning) => warning.where));
  return good(circuit, [
    ...read.warnings.filter((warning) => !expanded.has(warning.where)),
    ...shorten(notes),
    ...shorten(found.filter((problem) => !told.has(problem.where)).map(plain)),
  ]);
}

function expand(part: Part, where: string, problems: Problem[], notes: Problem[]): Part {
  const extra = part.extra ?? {};
  if (!Object.hasOwn(extra, SHORTHAND)) return part;
  const name = extra[SHORTHAND];
  const kind = kindOf(part.kind);
  // The unknown kind is told once, by the check of the parts.
  if (kind === undefined) return part;
  const form = typeof name === 'string' ? readyMadeOf(name) : undefined;
  if (form?.kind !== kind) {
    const forms = kind.readyMade.map((readyMade) => readyMade.id).join(', ');
    problems.push({
      where,
      what: `${quote(name)} is no ready-made form of ${kind.kind}.`,
      remedy: `Use one of ${forms}.`,
    });
    return part;
  }
  const made = form.readyMade.make();
  const settings = { ...made.settings, ...part.settings };
  const valve = part.valve ?? made.valve;
  const others = omit(extra, SHORTHAND);
  notes.push({
    where,
    what: `The part is taken as ready-made ${quote(name)}.`,
    remedy: 'Nothing to do; when saved, the file holds its data instead of this word.',
  });
  return {
    ...omit(part, 'extra'),
    ...(Object.keys(settings).length > 0 && { settings }),
    ...(valve !== undefined && { valve }),
    ...(Object.keys(others).length > 0 && { extra: others }),
  };
}
