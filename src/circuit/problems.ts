import type { z } from 'zod';
import type { Problem } from '../base/result.ts';
import { sayPath } from './json.ts';
import { LIMITS } from './limits.ts';
import { HALVES } from './schema-words.ts';

type Issue = z.core.$ZodIssue;

const NOUNS: Record<string, string> = {
  string: 'a text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  array: 'a list',
  tuple: 'a list',
  object: 'an object',
  record: 'an object',
};
const noun = (type: string): string => NOUNS[type] ?? type;

function nounOf(value: unknown): string {
  if (value === null) return 'null';
  if (Array.isArray(value)) return 'a list';
  if (typeof value === 'number') return Number.isFinite(value) ? 'a number' : `${value}, which is not a finite number`;
  return noun(typeof value);
}

function valueAt(root: unknown, path: readonly PropertyKey[]): unknown {
  let value = root;
  for (const step of path) {
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, step)) return undefined;
    value = (value as Record<PropertyKey, unknown>)[step];
  }
  return value;
}

/** One zod issue in the program's own words. */
export function sayIssue(issue: Issue, root: unknown): Problem {
  const where = sayPath(issue.path);
  const value = valueAt(root, issue.path);
  const wanted = want(issue);
  if (value === undefined) return { where, what: 'This field is missing.', remedy: wanted ?? 'Add it.' };
  // What is wrong with the name of an entry is told by the name's own issue.
  const told = issue.code === 'invalid_key' ? (issue.issues[0]?.message ?? issue.message) : issue.message;
  const [what, remedy] = told.split(HALVES);
  if (what !== undefined && remedy !== undefined) return { where, what, remedy };
  if (issue.code === 'invalid_type')
    return { where, what: `This is ${nounOf(value)}.`, remedy: wanted ?? 'Change it.' };
  return { where, what: `${quote(value)} is not allowed here.`, remedy: wanted ?? issue.message };
}

function want(issue: Issue): string | undefined {
  if (issue.code === 'invalid_type') return `Write ${noun(issue.expected)}.`;
  if (issue.code === 'invalid_value') return `Use ${issue.values.map((v) => JSON.stringify(v)).join(', ')}.`;
  const [, remedy] = issue.message.split(HALVES);
  return remedy;
}

/** A value of the file, short enough for a message. */
export function quote(value: unknown): string {
  if (typeof value === 'object' && value !== null) return nounOf(value);
  const said = JSON.stringify(value) ?? String(value);
  return said.length > 60 ? `${said.slice(0, 59)}…` : said;
}

/** A broken file can hold thousands of faults: the first ones, and how many more. */
export function shorten(problems: readonly Problem[]): readonly Problem[] {
  const more = problems.length - LIMITS.problems;
  if (more <= 0) return problems;
  const rest: Problem = {
    where: 'file',
    what: `${more} more like these are not listed.`,
    remedy: 'Mend those above first.',
  };
  return [...problems.slice(0, LIMITS.problems), rest];
}
