import type { Circuit } from '../../circuit/model.ts';
import { labelOf } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import type { FoldAnswer, FoldBy } from '../../worker/client.ts';
import { actuatorsOf } from '../state/actuators.ts';
import { editor } from '../state/editor.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { whole } from '../state/whole.svelte.ts';
import type { FoldKey } from '../state/whole.svelte.ts';
import { FoldEntries } from './fold-entries.ts';

/** What the table can be folded by, as offered. */
export interface FoldChoice extends FoldKey {
  readonly title: string;
  readonly by: FoldBy;
}

export interface FoldChoices {
  readonly title: string;
  readonly list: readonly FoldChoice[];
}

/** How the folded table is looked at. */
class FoldView {
  on = $state(false);
  #key = $state.raw<FoldKey | undefined>();
  #opened = $state.raw<{ readonly answer: FoldAnswer; readonly folds: ReadonlySet<number> } | undefined>();

  /** Actuators, pumps, lines, and groups that share valves. */
  choices: readonly FoldChoices[] = $derived.by(() => choicesOf());
  choice: FoldChoice | undefined = $derived.by(() => {
    const all = this.choices.flatMap(({ list }) => list);
    return all.find(({ of, key }) => of === this.#key?.of && key === this.#key.key) ?? all[0];
  });
  answer = $derived(whole.fold.value);
  table = $derived(this.answer?.listed ? whole.asked?.table : undefined);
  opened: ReadonlySet<number> = $derived(
    this.answer && this.#opened?.answer === this.answer ? this.#opened.folds : new Set<number>(),
  );
  entries = $derived(this.answer && new FoldEntries(this.answer, this.table, this.opened));

  pick(key: FoldKey): void {
    this.#key = { of: key.of, key: key.key };
    this.on = true;
  }

  setOpen(fold: number, open: boolean): void {
    const { answer } = this;
    if (!answer) return;
    const folds = new Set(this.opened);
    if (open) folds.add(fold);
    else folds.delete(fold);
    this.#opened = { answer, folds };
  }

  /** The levers go to this combination. */
  go(positions: readonly number[]): void {
    session.inputs.forEach((input, i) => session.setPosition(input.part, positions[i] ?? 0));
  }
}

function choicesOf(): FoldChoices[] {
  // A table of some levers has the lines of all.
  const data =
    whole.asked?.table?.data ?? (session.answer?.circuit === editor.circuit ? session.table?.data : undefined);
  const groups = whole.fold.value?.groups ?? [];
  const circuit = whole.asked?.circuit ?? editor.circuit;
  const actuators = data?.actuators ?? actuatorsOf(circuit);
  const pumps = data?.pumps ?? pumpsOf(circuit);
  const lines = data?.lines ?? [];
  const one = (of: 'actuator' | 'pump' | 'line', index: number, key: string, title: string): FoldChoice => ({
    of,
    key,
    title,
    by: { of, index },
  });
  const all: FoldChoices[] = [
    { title: 'Actuators', list: actuators.map(({ part, label }, i) => one('actuator', i, part, label)) },
    {
      title: 'Actuators that share valves',
      list: groups.map((group, index) => ({
        of: 'group',
        key: String(index),
        title: group.map((i) => actuators[i]?.label ?? '').join(' + '),
        by: { of: 'group', index },
      })),
    },
    { title: 'Pumps', list: pumps.map(({ part, label }, i) => one('pump', i, part, label)) },
    { title: 'Lines', list: lines.map(({ name }, i) => one('line', i, name, name)) },
  ];
  return all.filter(({ list }) => list.length > 0);
}

const pumpsOf = (circuit: Circuit): { readonly part: string; readonly label: string }[] =>
  circuit.parts
    .filter((part) =>
      kindOf(part.kind)
        ?.elements(part)
        .some(({ type }) => type === 'pump'),
    )
    .map((part) => ({ part: part.id, label: labelOf(part) }));

export const foldView = new FoldView();
