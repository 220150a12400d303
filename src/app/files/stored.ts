/**
 * What the browser keeps beyond text: handles of files. Where it keeps nothing (a private window, a full disk),
 * it is as if nothing had ever been put in.
 */
const NAME = 'spooltable';
const STORE = 'kept';

let base: Promise<IDBDatabase> | undefined;

function opened(): Promise<IDBDatabase> {
  base ??= new Promise((resolve, reject) => {
    const request = indexedDB.open(NAME, 1);
    request.onupgradeneeded = () => request.result.createObjectStore(STORE);
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error ?? new Error('refused'));
  });
  return base;
}

async function run<T>(mode: IDBTransactionMode, ask: (store: IDBObjectStore) => IDBRequest<T>): Promise<T | undefined> {
  try {
    const request = ask((await opened()).transaction(STORE, mode).objectStore(STORE));
    return await new Promise((resolve, reject) => {
      request.onsuccess = () => resolve(request.result);
      request.onerror = () => reject(request.error ?? new Error('refused'));
    });
  } catch {
    return undefined;
  }
}

export const fetchStored = <T>(key: string): Promise<T | undefined> =>
  run('readonly', (store) => store.get(key) as IDBRequest<T>);

export const putStored = (key: string, value: unknown): Promise<unknown> =>
  run<unknown>('readwrite', (store): IDBRequest => (value === undefined ? store.delete(key) : store.put(value, key)));
