import { recall } from '../state/remembered.ts';

/**
 * Every window keeps its work in a slot of its own, so that none writes over another's. A slot belongs to a window
 * while that holds its lock; a window that is closed or has crashed leaves its slot to the next one.
 */
const FIRST = 'open';
const PREFIX = 'spooltable.';
const MINE = 'spooltable.slot';
/** A reload may come back before the browser has let go of the old page's lock; only a copied window waits in vain. */
const PATIENCE_MS = 3000;

const lockOf = (slot: string): string => `${PREFIX}${slot}`;

/** The browser lets locks go by itself, but after a reload the new page may be there first. */
const going = new Promise<void>((resolve) => window.addEventListener('pagehide', () => resolve()));

/** Held until the window goes. Throws where the browser has no locks for this page. */
function hold(slot: string, options: LockOptions): Promise<boolean> {
  return new Promise((resolve, reject) => {
    navigator.locks
      .request(lockOf(slot), options, (lock) => {
        resolve(lock !== null);
        return lock === null ? undefined : going;
      })
      .catch((error: unknown) => {
        if (error instanceof DOMException && error.name === 'TimeoutError') resolve(false);
        else reject(error instanceof Error ? error : new Error(String(error)));
      });
  });
}

function mine(): string | undefined {
  try {
    return sessionStorage.getItem(MINE) ?? undefined;
  } catch {
    return undefined;
  }
}

/** All slots that something is kept in. */
function used(): string[] {
  try {
    const slot = new RegExp(`^${FIRST}(?:\\.\\d+)?$`);
    return Object.keys(localStorage)
      .filter((key) => key.startsWith(PREFIX))
      .map((key) => key.slice(PREFIX.length))
      .filter((key) => slot.test(key))
      .sort();
  } catch {
    return [];
  }
}

/** Slots that no window holds but this one. */
export async function leftSlots(own: string): Promise<string[]> {
  if (!('locks' in navigator)) return [];
  const { held = [] } = await navigator.locks.query();
  const taken = new Set(held.map(({ name }) => name));
  return used().filter((slot) => slot !== own && !taken.has(lockOf(slot)));
}

async function claimed(): Promise<string> {
  const before = mine();
  if (before && (await hold(before, { signal: AbortSignal.timeout(PATIENCE_MS) }))) return before;
  const free = [FIRST, ...used().filter((slot) => slot !== FIRST)];
  for (const slot of free) if (await hold(slot, { ifAvailable: true })) return slot;
  for (let n = 2; ; n++) {
    const slot = `${FIRST}.${n}`;
    if (recall(slot, undefined) === undefined && (await hold(slot, { ifAvailable: true }))) return slot;
  }
}

/** The slot of this window: the one it had before a reload, else one that was left, else a new one. */
export async function claimSlot(): Promise<string> {
  if (!('locks' in navigator)) return FIRST;
  try {
    const slot = await claimed();
    sessionStorage.setItem(MINE, slot);
    return slot;
  } catch {
    return FIRST;
  }
}
