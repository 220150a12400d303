import { recall, remember } from './remembered.ts';

/** Points a newcomer at one lever, until one has been moved or the hint is put away. */
class Hint {
  /** Number of the slot, from 1; undefined = no hint. */
  slot = $state<number | undefined>();

  offer(slot: number): void {
    if (!recall('hintDone', false)) this.slot = slot;
  }

  dismiss(): void {
    if (this.slot === undefined) return;
    this.slot = undefined;
    remember('hintDone', true);
  }
}

export const hint = new Hint();
