import { codeOf, Failure, messageOf } from './failure.ts';

/** What is wrong with a command line, and where its help is. */
export const usage = (what: string, command = ''): Failure =>
  new Failure(`${what} See spooltable ${command}${command && ' '}--help.`);

/** Lets Node read the options; what it refuses becomes a `Failure` of one sentence. */
export function attempt<T>(command: string, parse: () => T): T {
  try {
    return parse();
  } catch (error) {
    if (codeOf(error)?.startsWith('ERR_PARSE_ARGS') !== true) throw error;
    // Node adds advice after the first sentence, and line feeds.
    const [sentence = ''] = messageOf(error).split(/\.\s|\n/);
    throw usage(`${sentence.replace(/\.$/, '')}.`, command);
  }
}

export function oneFile(command: string, files: readonly string[]): string {
  const [file, second] = files;
  if (file === undefined || file === '') throw usage('No circuit file is given.', command);
  if (second !== undefined) throw usage(`One circuit file is taken, and "${second}" is a second one.`, command);
  return file;
}

export function oneOf<T extends string>(command: string, option: string, value: string, allowed: readonly T[]): T {
  const found = allowed.find((word) => word === value);
  if (found === undefined) throw usage(`${option} takes ${allowed.join(' or ')}, not "${value}".`, command);
  return found;
}

export function loadCase(command: string, load: string | undefined): string | undefined {
  if (load === '') throw usage('--load needs the name of a load case.', command);
  return load;
}

export function outFile(command: string, out: string | undefined): string | undefined {
  if (out === '') throw usage('--out needs the name of a file.', command);
  return out === '-' ? undefined : out;
}
