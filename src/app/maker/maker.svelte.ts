import { changeValve, linesLost, type Renamed } from '../../circuit/edit-valve.ts';
import type { Edit } from '../../circuit/edit.ts';
import { labelOf, sayPort, type Circuit, type Connection, type ValveData } from '../../circuit/model.ts';
import {
  addReadyValve,
  alikeValves,
  changeReadyValve,
  linesLostOf,
  removeReadyValve,
  renameReadyValve,
  updateAlike,
} from '../../circuit/ready-valves.ts';
import type { PathKind } from '../../circuit/valve-box.ts';
import { kindOf } from '../../parts/catalogue.ts';
import { kindOfReady } from '../../parts/file-valves.ts';
import { DEFAULT_VALVE } from '../../parts/valve-forms.ts';
import { isStripValve } from '../../parts/valve-kinds.ts';
import { doChecked, sayRefused } from '../panels/checked.ts';
import { editor } from '../state/editor.svelte.ts';
import { view } from '../state/view.svelte.ts';

/** What is being made: a placed valve, or a ready-made one of the file. */
export type Target = { readonly of: 'part' | 'ready'; readonly id: string };

export interface Made {
  readonly title: string;
  readonly kind: string;
  readonly valve: ValveData;
}

/** Something that takes lines along, until somebody says yes. */
export interface Question {
  readonly text: string;
  readonly yes: string;
  readonly run: () => void;
}

/** What drawing from one port to another makes: each kind in turn, or one and the same. */
export type PathPen = 'turn' | Exclude<PathKind, 'back' | 'throttled-back'>;

function madeOf(circuit: Circuit, target: Target | undefined): Made | undefined {
  if (target?.of === 'part') {
    const part = circuit.parts.find(({ id }) => id === target.id);
    if (!part || !isStripValve(part.kind)) return undefined;
    const valve = part.valve ?? kindOf(part.kind)?.readyMade[0]?.make().valve;
    return valve && { title: labelOf(part), kind: part.kind, valve };
  }
  const ready = circuit.readyMadeValves?.find(({ id }) => id === target?.id);
  return ready && { title: ready.title, kind: kindOfReady(ready), valve: ready.valve };
}

const sayEnds = ({ from, to }: Connection): string => `${sayPort(from)} to ${sayPort(to)}`;

export function sayLines(lines: readonly Connection[]): string {
  const shown = lines.slice(0, 4).map(sayEnds).join(', ');
  const more = lines.length > 4 ? ` and ${lines.length - 4} more` : '';
  return `${lines.length === 1 ? 'the line' : `${lines.length} lines`} ${shown}${more}`;
}

class Maker {
  target = $state.raw<Target | undefined>();
  made: Made | undefined = $derived(madeOf(editor.circuit, this.target));
  pen = $state<PathPen>('turn');
  question = $state.raw<Question | undefined>();
  /** Last words of the status line. */
  said = $state.raw<{ readonly text: string; readonly refused: boolean }>({ text: '', refused: false });
  /** The ready-made valve as placed ones were made from it. */
  #before = $state.raw<ValveData | undefined>();

  /** Placed valves that are still as the ready-made one was. */
  alike: readonly string[] = $derived.by(() => {
    const { made } = this;
    if (this.target?.of !== 'ready' || !made || !this.#before || this.#before === made.valve) return [];
    return alikeValves(editor.circuit, made.kind, this.#before);
  });

  open(target: Target): void {
    this.target = target;
    this.question = undefined;
    this.#before = target.of === 'ready' ? madeOf(editor.circuit, target)?.valve : undefined;
    this.say('');
    view.open('maker');
  }

  /** On the valve that is selected, or on a new ready-made one. */
  openForSelection(): void {
    const [id] = editor.selection.parts;
    const part = editor.circuit.parts.find((each) => each.id === id);
    if (part && isStripValve(part.kind)) this.open({ of: 'part', id: part.id });
    else this.start();
  }

  /** A new ready-made valve of the file, 4/3 with all ports shut. */
  start(): void {
    this.#keep('Own valve', DEFAULT_VALVE, undefined, 'A new valve, 4/3 with all ports shut.');
  }

  say(text: string, refused = false): void {
    this.said = { text, refused };
  }

  /** Does an edit and says so; says why not where it is refused. */
  do(edit: () => Edit, said: string, burst?: string): boolean {
    try {
      doChecked(edit(), burst);
      this.say(said);
      return true;
    } catch (error) {
      this.say(sayRefused(error), true);
      return false;
    }
  }

  /** Changes the valve; asks first where lines would be lost. False = refused, or not yet. */
  change(make: (valve: ValveData) => ValveData, said: string, renamed: Renamed = {}): boolean {
    this.question = undefined;
    const { made, target } = this;
    if (!made || !target) return false;
    let valve: ValveData;
    try {
      valve = make(made.valve);
    } catch (error) {
      this.say(sayRefused(error), true);
      return false;
    }
    if (valve === made.valve) return true;
    const { id } = target;
    if (target.of === 'ready') return this.do(() => changeReadyValve(editor.circuit, id, valve), said);
    const edit = (): Edit => changeValve(editor.circuit, id, made.valve, valve, renamed);
    const lost = linesLost(editor.circuit, id, made.valve, valve, renamed);
    if (lost.length === 0) return this.do(edit, said);
    this.ask({
      text: `${said} This also removes ${sayLines(lost)}; what they joined stays unconnected.`,
      yes: 'Remove with lines',
      run: () => this.do(edit, `${said} Removed: ${sayLines(lost)}.`),
    });
    return false;
  }

  ask(question: Question): void {
    this.question = question;
    this.say('');
  }

  answer(yes: boolean): void {
    const { question } = this;
    this.question = undefined;
    if (yes) question?.run();
    else this.say('Left as it was.');
  }

  keepAs(title: string): boolean {
    const { made } = this;
    return made !== undefined && this.#keep(title, made.valve, made.kind, 'Kept in this circuit, ready to be placed.');
  }

  #keep(title: string, valve: ValveData, kind: string | undefined, said: string): boolean {
    const own = kind === 'directional-valve' ? undefined : kind;
    try {
      const added = addReadyValve(editor.circuit, title, valve, own);
      doChecked(added.edit);
      this.open({ of: 'ready', id: added.id });
      this.say(`${added.title}: ${said}`);
      return true;
    } catch (error) {
      this.say(sayRefused(error), true);
      return false;
    }
  }

  rename(title: string): boolean {
    const id = this.target?.id ?? '';
    return this.do(() => renameReadyValve(editor.circuit, id, title), `Now called ${title.trim()}.`);
  }

  /** Placed ones stay. */
  removeReady(id: string): void {
    if (this.target?.of === 'ready' && this.target.id === id) view.close('maker');
    this.do(() => removeReadyValve(editor.circuit, id), 'Removed from this circuit.');
  }

  updatePlaced(): void {
    const { made, alike } = this;
    if (!made || alike.length === 0) return;
    const run = (): void => {
      if (
        this.do(() => updateAlike(editor.circuit, alike, made.valve), `${alike.length} placed now stand as this one.`)
      )
        this.#before = made.valve;
    };
    const lost = linesLostOf(editor.circuit, alike, made.valve);
    if (lost.length === 0) return run();
    this.ask({ text: `This removes ${sayLines(lost)}.`, yes: 'Update and remove lines', run });
  }

  leavePlaced(): void {
    this.#before = this.made?.valve;
    this.say('The placed ones stay as they are.');
  }
}

export const maker = new Maker();
