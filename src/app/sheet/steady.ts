/** Same plain data all the way down. */
export function alike(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a)) {
    return Array.isArray(b) && a.length === b.length && a.every((each, i) => alike(each, b[i]));
  }
  const keys = Object.keys(a);
  if (Array.isArray(b) || keys.length !== Object.keys(b).length) return false;
  return keys.every((key) => Object.hasOwn(b, key) && alike((a as Record<string, unknown>)[key], (b as Record<string, unknown>)[key]));
}

/**
 * Remembers the last list and gives back its members where the new ones say the same, so that the views of
 * things that did not change are left alone while one part is dragged.
 */
export function steadyList<T extends object>(keyOf: (item: T, index: number) => string): (list: readonly T[]) => readonly T[] {
  let last = new Map<string, T>();
  return (list) => {
    const next = new Map<string, T>();
    const out = list.map((item, index) => {
      const key = keyOf(item, index);
      const before = last.get(key);
      const kept = before !== undefined && alike(before, item) ? before : item;
      next.set(key, kept);
      return kept;
    });
    last = next;
    return out;
  };
}
