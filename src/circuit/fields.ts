type Loose<T> = { [K in keyof T]: T[K] | undefined };

/** Drops `undefined` fields: the model has a field or has it not. */
export function solid<T extends object>(fields: Loose<T>): T {
  const out: Record<string, unknown> = {};
  for (const [key, value] of Object.entries(fields)) if (value !== undefined) out[key] = value;
  return out as T;
}

/** A copy without some fields. */
export function omit<T extends object, K extends keyof T>(object: T, ...keys: readonly K[]): Omit<T, K> {
  const out = { ...object };
  for (const key of keys) Reflect.deleteProperty(out, key);
  return out;
}
