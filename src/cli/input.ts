import { readFile, stat } from 'node:fs/promises';
import type { Circuit } from '../circuit/model.ts';
import { openCircuit } from '../parts/open.ts';
import { codeOf, Failure, messageOf, sayProblems } from './failure.ts';

const MOST_BYTES = 64 * 1024 * 1024;

/** The circuit of a file, `-` being standard input. Throws a `Failure` that names file, place and remedy. */
export async function readCircuitFile(file: string, note: (text: string) => void): Promise<Circuit> {
  const name = file === '-' ? 'standard input' : file;
  const bytes = file === '-' ? await readStandardInput() : await readBytes(file);
  const opened = openCircuit(decode(name, bytes));
  if (!opened.ok) throw new Failure(sayProblems(name, opened.problems));
  if (opened.warnings.length > 0) note(`note: ${sayProblems(name, opened.warnings)}`);
  return opened.value;
}

async function readBytes(file: string): Promise<Buffer> {
  try {
    const { size } = await stat(file);
    if (size > MOST_BYTES) throw tooLarge(file);
    return await readFile(file);
  } catch (error) {
    throw error instanceof Failure ? error : new Failure(`${file}: ${sayReadError(error)}`);
  }
}

function sayReadError(error: unknown): string {
  switch (codeOf(error)) {
    case 'ENOENT':
    case 'ENOTDIR':
      return 'There is no such file. Check its name and folder.';
    case 'EISDIR':
      return 'This is a folder. Name a circuit file in it.';
    case 'EACCES':
    case 'EPERM':
      return 'It may not be read. Ask for the right to read it.';
    default:
      return `It cannot be read: ${messageOf(error)}. Check the disk or copy the file elsewhere.`;
  }
}

async function readStandardInput(): Promise<Buffer> {
  const chunks: Buffer[] = [];
  let size = 0;
  for await (const chunk of process.stdin as AsyncIterable<Buffer>) {
    chunks.push(chunk);
    size += chunk.length;
    if (size > MOST_BYTES) throw tooLarge('standard input');
  }
  return Buffer.concat(chunks);
}

const tooLarge = (name: string): Failure =>
  new Failure(`${name}: It is larger than 64 MiB, which no circuit file is. Name a circuit file.`);

function decode(name: string, bytes: Buffer): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw new Failure(`${name}: This is not UTF-8 text. Open a file that the editor has saved.`);
  }
}
