import { notices } from '../state/notices.svelte.ts';
import { openBlob, openFromDisk } from './open.ts';
import { fetchStored, putStored } from './stored.ts';

/** A file that was opened or saved here; browsers without file access know its name only. */
export interface Recent {
  readonly name: string;
  /** Name of the circuit in it. */
  readonly circuit: string;
  readonly handle?: FileSystemFileHandle | undefined;
}

const KEY = 'recent';
const MOST = 8;

async function sameFile(one: Recent, other: Recent): Promise<boolean> {
  if (one.name !== other.name) return false;
  if (!one.handle || !other.handle) return true;
  return one.handle.isSameEntry(other.handle).catch(() => false);
}

class RecentFiles {
  list = $state.raw<readonly Recent[]>([]);
  /** One change after another, so that none is lost. */
  #last: Promise<unknown> = Promise.resolve();

  async start(): Promise<void> {
    this.list = (await fetchStored<readonly Recent[]>(KEY)) ?? [];
  }

  add(file: Recent): void {
    this.#change(async (list) => {
      const others = await Promise.all(list.map(async (each) => ((await sameFile(each, file)) ? [] : [each])));
      return [file, ...others.flat()].slice(0, MOST);
    });
  }

  clear(): void {
    this.#change(() => Promise.resolve([]));
  }

  #change(to: (list: readonly Recent[]) => Promise<readonly Recent[]>): void {
    this.#last = this.#last.then(async () => {
      // Other windows add to the same list.
      const list = await to((await fetchStored<readonly Recent[]>(KEY)) ?? this.list);
      this.list = list;
      await putStored(KEY, list);
    });
  }

  async open({ name, handle }: Recent): Promise<void> {
    if (!handle) return openFromDisk();
    try {
      if ((await handle.requestPermission?.({ mode: 'read' })) === 'denied') throw new Error('denied');
      await openBlob(await handle.getFile(), handle);
    } catch {
      notices.say({
        level: 'error',
        title: `${name} could not be opened again`,
        text: 'It was moved, renamed or deleted, or the browser may not read it any more. Use Open… to look for it. The open circuit is untouched.',
      });
    }
  }
}

export const recent = new RecentFiles();
