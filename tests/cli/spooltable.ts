import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { writeCircuit } from '../../src/circuit/file.ts';
import { circuit } from '../notation.ts';

const bin = fileURLToPath(new URL('../../src/cli/bin.mjs', import.meta.url));

export interface Ended {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

/** Runs the command line as a shell would, with `input` on its standard input. */
export function spooltable(
  args: readonly string[],
  options: { input?: string | Buffer; cwd?: string } = {},
): Promise<Ended> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [bin, ...args], { cwd: options.cwd });
    let out = '';
    let err = '';
    child.stdout.setEncoding('utf8').on('data', (text: string) => (out += text));
    child.stderr.setEncoding('utf8').on('data', (text: string) => (err += text));
    child.on('error', reject);
    child.on('close', (code) => resolve({ code, out, err }));
    child.stdin.on('error', () => undefined);
    child.stdin.end(options.input ?? '');
  });
}

/** An empty folder, and what takes it away again. */
export function passingFolder(): { path: string; remove: () => void } {
  const path = mkdtempSync(join(tmpdir(), 'spooltable-cli-'));
  return { path, remove: () => rmSync(path, { recursive: true, force: true }) };
}

/** Two valves on one pump: V1 all shut at rest, V2 a bypass centre. */
export const RIG =
  'P1 fixed-pump, T1 tank, R1 relief-valve, V1 directional-valve:valve-4/3-shut, V2 directional-valve:valve-4/3-bypass, C1 cylinder, C2 cylinder' +
  ' | P1.P R1.P V1.P V2.P | R1.T T1.T V1.T V2.T P1.S | V1.A C1.A | V1.B C1.B | V2.A C2.A | V2.B C2.B';

export function writeRig(folder: string, notation = RIG): string {
  const file = join(folder, 'rig.spool.json');
  writeFileSync(file, writeCircuit(circuit(notation)));
  return file;
}
