/** Small things a person expects to find as they left them. Storage may be full or forbidden: then they are forgotten. */
const PREFIX = 'spooltable.';

export function recall<T>(key: string, fallback: T): T {
  try {
    const text = localStorage.getItem(PREFIX + key);
    return text === null ? fallback : (JSON.parse(text) as T);
  } catch {
    return fallback;
  }
}

/** False when the browser would not keep it. */
export function remember(key: string, value: unknown): boolean {
  try {
    localStorage.setItem(PREFIX + key, JSON.stringify(value));
    return true;
  } catch {
    return false;
  }
}

export function forget(key: string): void {
  try {
    localStorage.removeItem(PREFIX + key);
  } catch {
    // Storage is forbidden: there is nothing to forget.
  }
}
