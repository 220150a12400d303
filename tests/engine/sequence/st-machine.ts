/** A reader and runner of the structured text that the program writes, for tests: IEC 61131-3 syntax, from memory. */

type Value = boolean | number;
type Expr = (m: StMachine) => Value;
type Statement = (m: StMachine) => void;

interface Token {
  readonly type: 'name' | 'number' | 'time' | 'mark';
  readonly text: string;
}

const TOKEN = /\(\*[\s\S]*?\*\)|\s+|(T#\d+ms)|([A-Za-z_]\w*)|(\d+)|(:=|<>|<=|>=|[()=<>:;,.])/gy;

function tokensOf(text: string): Token[] {
  const tokens: Token[] = [];
  TOKEN.lastIndex = 0;
  while (TOKEN.lastIndex < text.length) {
    const at = TOKEN.lastIndex;
    const match = TOKEN.exec(text);
    if (!match) throw new Error(`not structured text: ${text.slice(at, at + 30)}`);
    const [, time, name, number, mark] = match;
    if (time !== undefined) tokens.push({ type: 'time', text: time });
    if (name !== undefined) tokens.push({ type: 'name', text: name });
    if (number !== undefined) tokens.push({ type: 'number', text: number });
    if (mark !== undefined) tokens.push({ type: 'mark', text: mark });
  }
  return tokens;
}

/** A function block that can be run scan by scan. Names are held in capitals, as the language does. */
export class StMachine {
  readonly inputs: string[] = [];
  readonly outputs: string[] = [];
  readonly values = new Map<string, Value>();
  readonly timers = new Map<string, { elapsed: number; q: boolean }>();
  scanTime = 0;
  readonly #body: readonly Statement[];

  constructor(text: string) {
    this.#body = new Parser(tokensOf(text), this).block();
  }

  /** One scan, `scanTime` (ms) after the one before. */
  scan(inputs: Readonly<Record<string, boolean>>, scanTime: number): void {
    this.scanTime = scanTime;
    for (const [name, value] of Object.entries(inputs)) {
      if (!this.inputs.includes(name.toUpperCase())) throw new Error(`no input ${name}`);
      this.values.set(name.toUpperCase(), value);
    }
    for (const statement of this.#body) statement(this);
  }

  get(name: string): Value {
    const value = this.values.get(name);
    if (value === undefined) throw new Error(`not declared: ${name}`);
    return value;
  }
}

const bool = (value: Value): boolean => {
  if (typeof value !== 'boolean') throw new Error('a number stands where a BOOL is wanted');
  return value;
};

class Parser {
  readonly #tokens: readonly Token[];
  readonly #machine: StMachine;
  #at = 0;

  constructor(tokens: readonly Token[], machine: StMachine) {
    this.#tokens = tokens;
    this.#machine = machine;
  }

  block(): Statement[] {
    this.#want('FUNCTION_BLOCK');
    this.#name();
    for (const kind of ['VAR_INPUT', 'VAR_OUTPUT', 'VAR']) this.#declarations(kind);
    const body = this.#statements('END_FUNCTION_BLOCK');
    this.#want('END_FUNCTION_BLOCK');
    if (this.#at < this.#tokens.length) throw new Error('text after the end');
    return body;
  }

  #peek(text: string): boolean {
    return this.#tokens[this.#at]?.text.toUpperCase() === text;
  }
  #take(text: string): boolean {
    if (!this.#peek(text)) return false;
    this.#at += 1;
    return true;
  }
  #want(text: string): void {
    if (!this.#take(text)) throw new Error(`${text} is wanted, not ${this.#tokens[this.#at]?.text ?? 'the end'}`);
  }
  #name(): string {
    const token = this.#tokens[this.#at];
    if (token?.type !== 'name' || /__|_$/.test(token.text)) throw new Error(`no identifier: ${token?.text ?? ''}`);
    this.#at += 1;
    return token.text.toUpperCase();
  }

  #declarations(kind: string): void {
    this.#want(kind);
    while (!this.#take('END_VAR')) {
      const name = this.#name();
      if (this.#machine.values.has(name) || this.#machine.timers.has(name)) throw new Error(`declared twice: ${name}`);
      this.#want(':');
      if (this.#take('TON')) this.#machine.timers.set(name, { elapsed: -1, q: false });
      else if (this.#take('BOOL')) this.#machine.values.set(name, false);
      else {
        this.#want('INT');
        this.#want(':=');
        this.#machine.values.set(name, Number(this.#tokens[this.#at++]?.text));
      }
      this.#want(';');
      if (kind === 'VAR_INPUT') this.#machine.inputs.push(name);
      if (kind === 'VAR_OUTPUT') this.#machine.outputs.push(name);
    }
  }

  #statements(...ends: string[]): Statement[] {
    const list: Statement[] = [];
    while (!ends.some((end) => this.#peek(end)) && this.#tokens[this.#at]?.type !== 'number')
      list.push(this.#statement());
    return list;
  }

  #statement(): Statement {
    if (this.#take('IF')) return this.#if();
    if (this.#take('CASE')) return this.#case();
    const name = this.#name();
    if (this.#take('(')) return this.#call(name);
    this.#want(':=');
    const value = this.#or();
    this.#want(';');
    this.#machine.get(name);
    if (this.#machine.inputs.includes(name)) throw new Error(`an input is assigned: ${name}`);
    return (m) => {
      const now = value(m);
      if (typeof now !== typeof m.get(name)) throw new Error(`wrong type for ${name}`);
      m.values.set(name, now);
    };
  }

  #if(): Statement {
    const condition = this.#or();
    this.#want('THEN');
    const body = this.#statements('END_IF');
    this.#want('END_IF');
    this.#want(';');
    return (m) => {
      if (bool(condition(m))) for (const statement of body) statement(m);
    };
  }

  #case(): Statement {
    const choice = this.#or();
    this.#want('OF');
    const branches = new Map<number, Statement[]>();
    while (!this.#take('END_CASE')) {
      const token = this.#tokens[this.#at++];
      if (token?.type !== 'number') throw new Error('a branch begins with its number');
      this.#want(':');
      branches.set(Number(token.text), this.#statements('END_CASE'));
    }
    this.#want(';');
    return (m) => {
      for (const statement of branches.get(choice(m) as number) ?? []) statement(m);
    };
  }

  #call(name: string): Statement {
    if (!this.#machine.timers.has(name)) throw new Error(`no timer ${name}`);
    this.#want('IN');
    this.#want(':=');
    const on = this.#or();
    this.#want(',');
    this.#want('PT');
    this.#want(':=');
    const time = Number(/^T#(\d+)ms$/.exec(this.#tokens[this.#at++]?.text ?? '')?.[1]);
    if (!Number.isFinite(time)) throw new Error('no duration');
    this.#want(')');
    this.#want(';');
    return (m) => {
      const before = m.timers.get(name) ?? { elapsed: -1, q: false };
      // The time counts from the scan that first sees the input on.
      const elapsed = bool(on(m)) ? (before.elapsed < 0 ? 0 : before.elapsed + m.scanTime) : -1;
      m.timers.set(name, { elapsed, q: elapsed >= time });
    };
  }

  // NOT binds closest, then comparison, AND, OR: IEC 61131-3, precedence of operators.
  #or(): Expr {
    let left = this.#and();
    while (this.#take('OR')) {
      const [a, b] = [left, this.#and()];
      left = (m) => {
        const [x, y] = [bool(a(m)), bool(b(m))];
        return x || y;
      };
    }
    return left;
  }
  #and(): Expr {
    let left = this.#compare();
    while (this.#take('AND')) {
      const [a, b] = [left, this.#compare()];
      left = (m) => {
        const [x, y] = [bool(a(m)), bool(b(m))];
        return x && y;
      };
    }
    return left;
  }
  #compare(): Expr {
    const left = this.#unary();
    if (this.#take('=')) {
      const right = this.#unary();
      return (m) => left(m) === right(m);
    }
    if (!this.#take('>')) return left;
    const right = this.#unary();
    return (m) => (left(m) as number) > (right(m) as number);
  }
  #unary(): Expr {
    if (this.#take('NOT')) {
      const of = this.#unary();
      return (m) => !bool(of(m));
    }
    if (this.#take('(')) {
      const inner = this.#or();
      this.#want(')');
      return inner;
    }
    if (this.#take('TRUE')) return () => true;
    if (this.#take('FALSE')) return () => false;
    const token = this.#tokens[this.#at];
    if (token?.type === 'number') {
      this.#at += 1;
      return () => Number(token.text);
    }
    const name = this.#name();
    if (this.#take('.')) {
      this.#want('Q');
      if (!this.#machine.timers.has(name)) throw new Error(`no timer ${name}`);
      return (m) => m.timers.get(name)?.q === true;
    }
    this.#machine.get(name);
    return (m) => m.get(name);
  }
}
