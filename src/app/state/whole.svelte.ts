import type { Analyst, AskAnswer, Asked, FoldAnswer, FoldBy, Influence, Job, Next } from '../../worker/client.ts';
import type { Circuit } from '../../circuit/model.ts';
import { editor } from './editor.svelte.ts';
import { Inquiry } from './inquiry.svelte.ts';
import { session } from './session.svelte.ts';

/** What a fold is kept by while the circuit is edited: a part id, a line's name, or the number of a group. */
export interface FoldKey {
  readonly of: FoldBy['of'];
  readonly key: string;
}

/** Questions about the whole table: folds, influence, and rows in which something holds. */
class Whole {
  readonly fold = new Inquiry<FoldAnswer>();
  readonly influence = new Inquiry<Influence>();
  readonly rows = new Inquiry<AskAnswer>();
  /** What the influence on show is about. */
  #influenceOf: Asked | undefined;
  #analyst: Analyst | undefined;

  /** What a question is about now; undefined = there is nothing to ask about yet. */
  asked: Asked | undefined = $derived.by(() => {
    if (session.inputs.length === 0) return undefined;
    // With too many combinations to list, open paths answer; a table of some levers is no table of all.
    if (session.large || session.failure !== undefined)
      return { circuit: editor.circuit, conditions: session.conditions, table: undefined };
    const { answer } = session;
    if (!answer || answer.conditions.held !== undefined) return undefined;
    return { circuit: answer.circuit, conditions: answer.conditions, table: answer.table };
  });

  start(analyst: Analyst): void {
    this.#analyst = analyst;
  }

  askFold(asked: Asked, by: FoldBy): void {
    const analyst = this.#analyst;
    if (analyst) this.fold.run((progress) => analyst.fold(asked, by, progress));
  }

  /** Ask again only about another table. */
  askInfluence(asked: Asked, again = false): void {
    const analyst = this.#analyst;
    if (!analyst || (this.#influenceOf === asked && !again)) return;
    this.#influenceOf = asked;
    this.influence.run((progress) => analyst.influence(asked, progress));
  }

  leaveInfluence(): void {
    if (!this.influence.busy) return;
    this.#influenceOf = undefined;
    this.influence.clear();
  }

  askRows(asked: Asked, text: string): void {
    const analyst = this.#analyst;
    if (analyst) this.rows.run((progress) => analyst.rows(asked, text, progress), true);
  }

  next(circuit: Circuit, text: string, as: 'rule' | 'condition'): Job<readonly Next[]> | undefined {
    return this.#analyst?.next(circuit, text, as);
  }
}

export const whole = new Whole();
