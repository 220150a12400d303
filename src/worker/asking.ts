import { Cancelled } from '../base/budget.ts';
import type { TableData } from '../engine/table/table-data.ts';
import type { Holding, Question, Reply } from './messages.ts';
import { startThread } from './thread.ts';

/** A running request: await `answer`, or `cancel()`, upon which `answer` rejects with `Cancelled`. */
export interface Job<T> {
  readonly answer: Promise<T>;
  readonly cancel: () => void;
}

/** A table that goes with a question; it crosses over once for all questions about it. */
export interface With {
  readonly table: TableData | undefined;
}

interface Pending {
  readonly question: Question;
  readonly held: With | undefined;
  readonly settle: (reply: Reply) => void;
  readonly refuse: (error: Error) => void;
}

type Open<Q> = Q extends unknown ? Omit<Q, 'id'> : never;

/**
 * A worker that answers one question after another. What is given up before its turn is never sent; what is
 * given up while it is worked on may still come to its end within `patience` (ms), since a fresh worker has to
 * load and warm up. Then the worker is ended, and a fresh one takes over the rest.
 */
export class Asking {
  readonly #patience: number;
  #worker: Worker | undefined;
  #next = 1;
  readonly #pending = new Map<number, Pending>();
  /** The question that is worked on, given up or not. */
  #asked: number | undefined;
  #holds: TableData | undefined;
  #deadline: ReturnType<typeof setTimeout> | undefined;

  constructor(patience = 0) {
    this.#patience = patience;
  }

  ask<T>(
    open: Open<Question>,
    meanwhile: (reply: Reply) => void,
    read: (reply: Reply) => T | undefined,
    held?: With,
  ): Job<T> {
    const id = this.#next++;
    const question = { ...open, id } as Question;
    const answer = new Promise<T>((resolve, reject) => {
      const settle = (reply: Reply): void => {
        if (isOnTheWay(reply)) {
          meanwhile(reply);
          return;
        }
        const value = read(reply);
        if (value !== undefined) resolve(value);
        else
          reject(
            new Error(reply.say === 'failed' ? reply.message : 'The analysis gave an answer to another question.'),
          );
      };
      this.#pending.set(id, { question, held, settle, refuse: reject });
    });
    this.#sendNext();
    return { answer, cancel: () => this.#giveUp(id) };
  }

  stop(): void {
    this.#end();
    for (const { refuse } of this.#pending.values()) refuse(new Cancelled());
    this.#pending.clear();
  }

  #sendNext(): void {
    if (this.#asked !== undefined) return;
    const [first] = this.#pending.values();
    if (!first) return;
    const { question, held } = first;
    const worker = this.#running();
    if (held && held.table !== this.#holds) {
      this.#holds = held.table;
      worker.postMessage({ ask: 'hold', data: held.table } satisfies Holding);
    }
    this.#asked = question.id;
    // Reactive proxies cannot be cloned across threads; circuits are plain JSON anyway.
    worker.postMessage(JSON.parse(JSON.stringify(question)));
  }

  #running(): Worker {
    if (this.#worker) return this.#worker;
    this.#holds = undefined;
    const worker = startThread();
    worker.onmessage = ({ data }: MessageEvent<Reply>) => {
      const asked = this.#pending.get(data.id);
      if (isOnTheWay(data)) {
        asked?.settle(data);
        return;
      }
      this.#pending.delete(data.id);
      this.#asked = undefined;
      clearTimeout(this.#deadline);
      this.#sendNext();
      asked?.settle(data);
    };
    worker.onerror = (event) => {
      const pending = [...this.#pending.values()];
      this.#pending.clear();
      this.#end();
      for (const { refuse } of pending) refuse(new Error(event.message || 'The analysis stopped unexpectedly.'));
    };
    this.#worker = worker;
    return worker;
  }

  #giveUp(id: number): void {
    const given = this.#pending.get(id);
    if (!given) return;
    this.#pending.delete(id);
    given.refuse(new Cancelled());
    if (id !== this.#asked) return;
    if (this.#patience === 0) this.#startAfresh();
    else this.#deadline = setTimeout(() => this.#startAfresh(), this.#patience);
  }

  #startAfresh(): void {
    this.#end();
    this.#sendNext();
  }

  #end(): void {
    clearTimeout(this.#deadline);
    this.#worker?.terminate();
    this.#worker = undefined;
    this.#asked = undefined;
  }
}

/** True of what comes before the answer. */
const isOnTheWay = (reply: Reply): boolean => reply.say === 'progress' || (reply.say === 'table' && reply.early);
