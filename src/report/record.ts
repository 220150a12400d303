/** Keys and values in step, millions of times; a label such as `__proto__` is a key like any other. */
export function record<T>(keys: readonly string[], valueOf: (index: number) => T): Record<string, T> {
  const out: Record<string, T> = {};
  for (let i = 0; i < keys.length; i++) {
    const key = keys[i] as string;
    if (key === '__proto__') Object.defineProperty(out, key, { value: valueOf(i), enumerable: true });
    else out[key] = valueOf(i);
  }
  return out;
}
