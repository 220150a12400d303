/** When each file was last written, as far as this window knows: what differs now was written by somebody else. */
const known = new WeakMap<FileSystemFileHandle, number>();

export const seenOnDisk = (handle: FileSystemFileHandle, modified: number): void => void known.set(handle, modified);
export const lastSeen = (handle: FileSystemFileHandle): number | undefined => known.get(handle);

/** True when the file was written since this window read or wrote it; a file that is gone has not been. */
export async function writtenByOthers(handle: FileSystemFileHandle): Promise<boolean> {
  const seen = known.get(handle);
  if (seen === undefined) return false;
  try {
    return (await handle.getFile()).lastModified !== seen;
  } catch {
    return false;
  }
}

export async function look(handle: FileSystemFileHandle): Promise<void> {
  try {
    known.set(handle, (await handle.getFile()).lastModified);
  } catch {
    // Gone already: the next write says what is wrong with it.
  }
}
