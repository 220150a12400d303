import { once } from 'node:events';
import { rmSync } from 'node:fs';
import { open, realpath, rename, rm, stat } from 'node:fs/promises';
import { basename, dirname, join, resolve } from 'node:path';
import { codeOf, Failure, messageOf } from './failure.ts';

const BLOCK = 64 * 1024;

/** Puts many small pieces together into few writes. */
function* blocks(pieces: Iterable<string>): Generator<string> {
  let block = '';
  for (const piece of pieces) {
    block += piece;
    if (block.length < BLOCK) continue;
    yield block;
    block = '';
  }
  if (block !== '') yield block;
}

/** To standard output, no faster than its reader takes it. */
export async function print(pieces: Iterable<string>): Promise<void> {
  for (const block of blocks(pieces)) {
    if (!process.stdout.write(block)) await once(process.stdout, 'drain');
  }
}

/**
 * Writes a file whole or not at all: into a new file beside it, which then takes its name. A link is followed, rights are kept.
 * Refuses what is no regular file, and the circuit file itself.
 */
export async function writeWhole(file: string, circuitFile: string, pieces: Iterable<string>): Promise<void> {
  const target = await resolveTarget(file);
  if (circuitFile !== '-' && target.path === (await realpath(circuitFile).catch(() => undefined))) {
    throw new Failure(`--out ${file}: This is the circuit file itself. Name another file.`);
  }
  const passing = join(dirname(target.path), `.${basename(target.path)}.${process.pid}.part`);
  const forget = (): void => rmSync(passing, { force: true });
  process.once('exit', forget);
  try {
    const handle = await open(passing, 'wx', target.mode);
    try {
      for (const block of blocks(pieces)) await handle.writeFile(block);
      await handle.sync();
    } finally {
      await handle.close();
    }
    await rename(passing, target.path);
  } catch (error) {
    await rm(passing, { force: true }).catch(() => undefined);
    if (codeOf(error) === undefined) throw error;
    throw new Failure(`--out ${file}: ${sayWriteError(error)}`);
  } finally {
    process.off('exit', forget);
  }
}

async function resolveTarget(file: string): Promise<{ readonly path: string; readonly mode: number }> {
  try {
    const path = await realpath(file);
    const { mode, isFile, isDirectory } = await stat(path).then((s) => ({
      mode: s.mode & 0o777,
      isFile: s.isFile(),
      isDirectory: s.isDirectory(),
    }));
    if (isDirectory) throw new Failure(`--out ${file}: This is a folder. Name a file in it.`);
    if (!isFile)
      throw new Failure(`--out ${file}: This is no regular file. Leave --out away and redirect the output instead.`);
    return { path, mode };
  } catch (error) {
    if (error instanceof Failure) throw error;
    if (codeOf(error) === 'ENOENT' && !/[/\\]$/.test(file)) return { path: resolve(file), mode: 0o666 };
    throw new Failure(`--out ${file}: ${sayWriteError(error)}`);
  }
}

function sayWriteError(error: unknown): string {
  switch (codeOf(error)) {
    case 'ENOENT':
    case 'ENOTDIR':
      return 'Its folder does not exist. Make the folder first.';
    case 'EACCES':
    case 'EPERM':
    case 'EROFS':
      return 'Its folder may not be written to. Name another folder.';
    case 'ENOSPC':
      return 'The disk is full. Make room, then try again.';
    default:
      return `It cannot be written: ${messageOf(error)}. Name another file.`;
  }
}
