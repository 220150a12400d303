import { editor } from '../state/editor.svelte.ts';
import { notices } from '../state/notices.svelte.ts';
import { newCircuit } from './open.ts';

/** What windows of the editor say to one another about the file that each has open. */
interface Word {
  /** `open`: I have just opened this. `ask`: who has it? `also`: so have I. `gone`: I have it no longer. */
  readonly say: 'open' | 'ask' | 'also' | 'gone';
  readonly from: string;
  /** Only this window is meant. */
  readonly to?: string;
  readonly name: string;
  readonly handle?: FileSystemFileHandle | undefined;
}

/** Same place on disk if both windows know the place, else the same name. */
async function same(word: Word): Promise<boolean> {
  const { handle, fileName } = editor;
  if (fileName === undefined || word.name !== fileName) return false;
  if (!handle || !word.handle) return true;
  try {
    return await handle.isSameEntry(word.handle);
  } catch {
    return true;
  }
}

class Windows {
  /** Ids of the other windows that have this file open. */
  #others = $state.raw<ReadonlySet<string>>(new Set());
  alsoOpen = $derived(this.#others.size > 0);

  #id = crypto.randomUUID();
  #channel: BroadcastChannel | undefined;
  #holding: Pick<Word, 'name' | 'handle'> | undefined;

  start(): () => void {
    try {
      this.#channel = new BroadcastChannel('spooltable.windows');
    } catch {
      return () => undefined;
    }
    this.#channel.onmessage = ({ data }: MessageEvent<Word>) => void this.#hear(data);
    return () => {
      this.left();
      this.#channel?.close();
    };
  }

  /** This window has another file now, or none. */
  holds(name: string | undefined, handle: FileSystemFileHandle | undefined): void {
    if (this.#holding?.name === name && this.#holding?.handle === handle) return;
    this.left();
    if (name === undefined) return;
    this.#holding = { name, handle };
    this.#say({ say: 'open' });
  }

  /** Windows that have crashed say nothing more: whoever still has it answers. */
  askAgain(): void {
    if (!this.#holding) return;
    this.#others = new Set();
    this.#say({ say: 'ask' });
  }

  left(): void {
    if (this.#holding) this.#say({ say: 'gone' });
    this.#holding = undefined;
    this.#others = new Set();
  }

  #say(word: Pick<Word, 'say' | 'to'>): void {
    if (this.#holding) this.#channel?.postMessage({ ...word, ...this.#holding, from: this.#id } satisfies Word);
  }

  async #hear(word: Word): Promise<void> {
    if (word.to !== undefined && word.to !== this.#id) return;
    if (word.say === 'gone') {
      this.#others = new Set([...this.#others].filter((each) => each !== word.from));
      return;
    }
    if (!(await same(word))) return;
    const known = this.#others.has(word.from);
    this.#others = new Set([...this.#others, word.from]);
    if (word.say !== 'also') this.#say({ say: 'also', to: word.from });
    if (known || word.say === 'ask') return;
    if (word.say === 'open') this.#warnFirst(word.name);
    else if (!document.hidden) this.#warnSecond(word.name);
  }

  #warnFirst(name: string): void {
    notices.say({
      level: 'error',
      title: `${name} has been opened in another window as well`,
      text: 'Go on here. Whichever window saves second is asked before it writes over what the other saved.',
    });
  }

  #warnSecond(name: string): void {
    notices.say({
      level: 'error',
      title: `${name} is open in another window too`,
      text: 'Changes made there do not show here. Whichever window saves second is asked before it writes over what the other saved.',
      action: { text: 'Leave it to the other window', run: newCircuit },
    });
  }
}

export const windows = new Windows();
