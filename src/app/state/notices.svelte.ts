import type { Problem } from '../../base/result.ts';

/** Something said once, in words, that never stands in the way. */
export interface Notice {
  readonly id: number;
  readonly level: 'note' | 'error';
  readonly title: string;
  readonly text?: string;
  /** Where in a file, what, and what to do about it. */
  readonly problems?: readonly Problem[];
  /** A note that does not go by itself. */
  readonly stays?: boolean;
  readonly action?: { readonly text: string; readonly run: () => void };
}

const LINGER_MS = 9000;

class Notices {
  list = $state.raw<readonly Notice[]>([]);
  #next = 1;

  /** Notes go by themselves; errors stay until they are put away. */
  say(notice: Omit<Notice, 'id'>): void {
    const id = this.#next++;
    this.list = [...this.list.filter((each) => each.title !== notice.title), { ...notice, id }];
    if (notice.level === 'note' && !notice.stays) setTimeout(() => this.dismiss(id), LINGER_MS);
  }

  dismiss(id: number): void {
    this.list = this.list.filter((notice) => notice.id !== id);
  }
}

export const notices = new Notices();
