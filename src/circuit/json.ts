import { bad, good, type Problem, type Result } from '../base/result.ts';
import { LIMITS, RESERVED } from './limits.ts';

/**
 * Read JSON from an untrusted text. Refuses, with the place: what is not JSON (line and column), objects nested
 * deeper than `LIMITS.depth`, and names such as `__proto__` that would reach an object's machinery.
 */
export function parseJson(text: string): Result<unknown> {
  if (text.length > LIMITS.text) {
    return bad({
      where: 'file',
      what: `The file is too large: ${text.length} characters.`,
      remedy: `At most ${LIMITS.text} can be read. Split the circuit into several files.`,
    });
  }
  const bare = text.startsWith('\ufeff') ? text.slice(1) : text;
  let value: unknown;
  try {
    value = JSON.parse(bare);
  } catch {
    const fault = findFault(bare);
    const before = bare.slice(0, fault.at).split('\n');
    const column = (before.at(-1) as string).length + 1;
    return bad({
      where: `line ${before.length}, column ${column}`,
      what: `The file is not JSON: ${fault.what}`,
      remedy: fault.remedy,
    });
  }
  const hazard = findHazard(value);
  return hazard ? bad(hazard) : good(value);
}

/** `parts[3].settings.flow` */
export function sayPath(path: readonly PropertyKey[]): string {
  let said = '';
  for (const step of path) {
    if (typeof step === 'number') said += `[${step}]`;
    else if (/^[A-Za-z_$][\w$]*$/.test(String(step))) said += said === '' ? String(step) : `.${String(step)}`;
    else said += `[${JSON.stringify(String(step).slice(0, 60))}]`;
  }
  return said === '' ? 'file' : said;
}

/** Walks with its own stack, so that deep nesting cannot exhaust the program's. */
function findHazard(root: unknown): Problem | undefined {
  interface Seen {
    readonly value: object;
    readonly key: PropertyKey;
    readonly depth: number;
    readonly up: Seen | undefined;
  }
  const pathOf = (seen: Seen | undefined, last?: string): string => {
    const path: PropertyKey[] = last === undefined ? [] : [last];
    for (let s = seen; s?.up !== undefined; s = s.up) path.unshift(s.key);
    return sayPath(path);
  };
  if (typeof root !== 'object' || root === null) return undefined;
  const stack: Seen[] = [{ value: root, key: '', depth: 1, up: undefined }];
  for (let seen = stack.pop(); seen !== undefined; seen = stack.pop()) {
    if (seen.depth > LIMITS.depth) {
      return {
        where: pathOf(seen).slice(0, 200),
        what: `Objects and lists stand more than ${LIMITS.depth} deep in one another here.`,
        remedy: 'No circuit needs this. Remove the nested data.',
      };
    }
    const isList = Array.isArray(seen.value);
    for (const [key, value] of Object.entries(seen.value as Record<string, unknown>)) {
      if (RESERVED.has(key)) {
        return {
          where: pathOf(seen, key),
          what: `The name "${key}" is not allowed in a file.`,
          remedy: 'Remove or rename this field.',
        };
      }
      if (typeof value === 'object' && value !== null) {
        stack.push({ value, key: isList ? Number(key) : key, depth: seen.depth + 1, up: seen });
      }
    }
  }
  return undefined;
}

interface Fault {
  readonly at: number;
  readonly what: string;
  readonly remedy: string;
}

const TOKEN =
  /[ \t\n\r]*(?:([{}[\],:])|("(?:[^"\\\u0000-\u001f]|\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4}))*")|(-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?(?![\w.])|(?:true|false|null)(?!\w)))/y;

/** The engines word and place their JSON errors differently (or not at all), so the first fault is sought here. */
function findFault(text: string): Fault {
  const open: string[] = [];
  // What may come next: a value, a key, the mark after a key, or what ends a value.
  let due: 'value' | 'first value' | 'key' | 'first key' | 'colon' | 'end' = 'value';
  let at = 0;
  const wanted = (): string => {
    if (due === 'colon') return 'A ":" should stand here, after the name of a field.';
    if (due === 'key' || due === 'first key')
      return `The name of a field in double quotes${due === 'key' ? '' : ', or "}",'} should stand here.`;
    if (due === 'end')
      return open.length === 0
        ? 'Nothing should follow the end of the data.'
        : `A "," or "${open.at(-1) === '{' ? '}' : ']'}" should stand here.`;
    return 'A value should stand here.';
  };
  for (;;) {
    TOKEN.lastIndex = at;
    const match = TOKEN.exec(text);
    if (!match) return faultAt(text, at, wanted());
    const [all, mark, string] = match;
    const start = at + all.length - all.trimStart().length;
    at += all.length;
    const closes = mark === '}' ? '{' : mark === ']' ? '[' : undefined;
    if (due === 'value' || due === 'first value') {
      if (mark === '{' || mark === '[') {
        open.push(mark);
        due = mark === '{' ? 'first key' : 'first value';
        continue;
      }
      if (mark === undefined) {
        due = 'end';
        continue;
      }
      if (!(due === 'first value' && mark === ']')) return faultAt(text, start, wanted());
    }
    if (due === 'colon') {
      if (mark !== ':') return faultAt(text, start, wanted());
      due = 'value';
      continue;
    }
    if ((due === 'key' || due === 'first key') && string !== undefined) {
      due = 'colon';
      continue;
    }
    const mayClose = due === 'end' || (due === 'first key' && mark === '}') || (due === 'first value' && mark === ']');
    if (mayClose && closes !== undefined && open.at(-1) === closes) {
      open.pop();
      due = 'end';
    } else if (due === 'end' && mark === ',' && open.length > 0) {
      due = open.at(-1) === '{' ? 'key' : 'value';
    } else {
      return faultAt(text, start, wanted());
    }
  }
}

function faultAt(text: string, from: number, wanted: string): Fault {
  let at = from;
  while (at < text.length && ' \t\n\r'.includes(text[at] as string)) at++;
  if (at >= text.length) {
    const what = text.trim() === '' ? 'it is empty.' : 'it ends too early.';
    return { at: text.length, what, remedy: 'Check that the whole file was saved or copied.' };
  }
  const word = /^[-+]?(NaN|Infinity)\b/.exec(text.slice(at, at + 12));
  if (word) return { at, what: `${word[0]} is not a number.`, remedy: 'Write a finite number.' };
  if (text[at] === '"') {
    return {
      at,
      what: 'this text is not closed, or holds a bare line break or a wrong "\\".',
      remedy: 'Close it with a double quote.',
    };
  }
  const found = String.fromCodePoint(text.codePointAt(at) as number);
  return { at, what: `unexpected ${JSON.stringify(found)}.`, remedy: wanted };
}
