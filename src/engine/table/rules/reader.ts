import type { Problem } from '../../../base/result.ts';

/** What is wrong with a rule, where (0-based, in characters of the text), and what to do about it. */
export class Fault extends Error {
  readonly at: number;
  readonly remedy: string;

  constructor(at: number, what: string, remedy: string) {
    super(what);
    this.name = 'Fault';
    this.at = at;
    this.remedy = remedy;
  }

  get problem(): Problem {
    return { where: `column ${this.at + 1}`, what: this.message, remedy: this.remedy };
  }
}

const ENDS = /[\s(),/"]/;

/** Words, names or a figure that may come next. */
export interface Continuation {
  readonly kind: 'word' | 'name' | 'figure';
  readonly text: string;
}

/** Reads a rule from left to right: words of the language in any case, names as they are shown. */
export class Reader {
  readonly text: string;
  at = 0;
  /** What was looked for where the text ends: how it may go on. */
  readonly #wanted: Continuation[] | undefined;

  constructor(text: string, wanted?: Continuation[]) {
    this.text = text;
    this.#wanted = wanted;
    this.skip();
  }

  skip(): void {
    while (this.at < this.text.length && /\s/.test(this.text[this.at] as string)) this.at += 1;
  }

  get ended(): boolean {
    return this.at >= this.text.length;
  }

  want(kind: Continuation['kind'], text: string): void {
    if (this.ended) this.#wanted?.push({ kind, text });
  }

  /** The word that comes next, for messages. */
  get next(): string {
    if (this.ended) return '';
    let end = this.at + 1;
    while (end < this.text.length && !ENDS.test(this.text[end] as string)) end += 1;
    return this.text.slice(this.at, end);
  }

  /** Takes a mark such as `(` if it comes next. */
  mark(mark: string): boolean {
    this.want('word', mark);
    if (this.text[this.at] !== mark) return false;
    this.at += 1;
    this.skip();
    return true;
  }

  /** Where the words end if they come next, whatever the blanks between them; -1 if they do not. */
  #endOf(words: string, exact: boolean): number {
    let at = this.at;
    for (const word of words.split(/\s+/)) {
      if (at !== this.at) {
        const before = at;
        while (/\s/.test(this.text[at] ?? '')) at += 1;
        if (at === before) return -1;
      }
      const here = this.text.slice(at, at + word.length);
      if (exact ? here !== word : here.toLowerCase() !== word.toLowerCase()) return -1;
      at += word.length;
    }
    return at === this.text.length || ENDS.test(this.text[at] as string) ? at : -1;
  }

  /** Takes these words of the language if they come next. */
  words(words: string): boolean {
    this.want('word', words);
    const end = this.#endOf(words, false);
    if (end < 0) return false;
    this.at = end;
    this.skip();
    return true;
  }

  peek(words: string): boolean {
    return this.#endOf(words, false) >= 0;
  }

  /**
   * Takes the longest of the phrases that comes next, in quotes or without; as written first, then in any
   * case. Returns its number, -1 if none comes.
   */
  oneOf(phrases: readonly string[], kind: Continuation['kind'] = 'word'): number {
    if (this.ended && this.#wanted) for (const phrase of phrases) this.want(kind, phrase);
    if (this.text[this.at] === '"') return this.#quoted(phrases);
    for (const exact of [true, false]) {
      let best = -1;
      let furthest = this.at;
      phrases.forEach((phrase, i) => {
        const end = phrase.trim() === '' ? -1 : this.#endOf(phrase.trim(), exact);
        if (end > furthest) [best, furthest] = [i, end];
      });
      if (best < 0) continue;
      this.at = furthest;
      this.skip();
      return best;
    }
    return -1;
  }

  #quoted(phrases: readonly string[]): number {
    const end = this.text.indexOf('"', this.at + 1);
    if (end < 0) throw new Fault(this.at, 'This quote is not closed.', 'Put a double quote at both ends of the name.');
    const name = this.text.slice(this.at + 1, end);
    const found = phrases.indexOf(name);
    if (found < 0) return -1;
    this.at = end + 1;
    this.skip();
    return found;
  }
}

/** The name that was probably meant: one letter wrong, missing or too many. */
export function nearest(word: string, names: readonly string[]): string | undefined {
  const wanted = word.toLowerCase();
  return names.find((name) => distance(wanted, name.toLowerCase()) === 1);
}

function distance(a: string, b: string): number {
  if (Math.abs(a.length - b.length) > 1) return 2;
  let row = Array.from({ length: b.length + 1 }, (_, i) => i);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      const changed = (row[j - 1] as number) + (a[i - 1] === b[j - 1] ? 0 : 1);
      next.push(Math.min(changed, (row[j] as number) + 1, (next[j - 1] as number) + 1));
    }
    row = next;
  }
  return row[b.length] as number;
}
