export const FILE_TYPES = [{ description: 'Spooltable circuit', accept: { 'application/json': ['.json'] } }] as const;

/** Undefined when the person closes the system's window without picking. */
export async function pick<T>(ask: () => Promise<T> | undefined): Promise<T | undefined> {
  try {
    return await ask();
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') return undefined;
    throw error;
  }
}

export interface Picked {
  readonly blob: File;
  /** Its place on disk, where the browser tells it. */
  readonly handle?: FileSystemFileHandle;
}

/** Lets the person pick a file; undefined when none is picked. */
export async function askForFile(): Promise<Picked | undefined> {
  if (!window.showOpenFilePicker) return askByField();
  const [handle] = (await pick(() => window.showOpenFilePicker?.({ types: FILE_TYPES }))) ?? [];
  return handle && { blob: await handle.getFile(), handle };
}

function askByField(): Promise<Picked | undefined> {
  const input = document.createElement('input');
  input.type = 'file';
  input.accept = '.json,application/json';
  input.hidden = true;
  // Outside the page the browser may clear it away while its window is still open.
  document.body.append(input);
  return new Promise((resolve) => {
    const done = (): void => {
      const [blob] = input.files ?? [];
      input.remove();
      resolve(blob && { blob });
    };
    input.addEventListener('cancel', done);
    input.addEventListener('change', done);
    input.click();
  });
}
