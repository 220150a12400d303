import { bad, good, type Result } from '../base/result.ts';
import { VERSION } from './schema.ts';

export type RawFile = Readonly<Record<string, unknown>>;
/** Raises a file from its version to the next one. */
export type Step = (file: RawFile) => RawFile;

/** version → the step that raises it. The newest version needs no change. */
export const STEPS: ReadonlyMap<number, Step> = new Map([[VERSION, (file) => file]]);

/**
 * Bring a file of any known version to the newest.
 * `steps` is a parameter so that tests can try the way from a version that never was.
 */
export function migrate(file: RawFile, steps: ReadonlyMap<number, Step> = STEPS): Result<RawFile> {
  const where = 'version';
  const { version } = file;
  if (version === undefined)
    return bad({ where, what: 'The version is missing.', remedy: `Write "version": ${VERSION}.` });
  if (typeof version !== 'number' || !Number.isInteger(version)) {
    return bad({ where, what: 'The version is not a whole number.', remedy: `Write "version": ${VERSION}.` });
  }
  if (version > VERSION) {
    return bad({
      where,
      what: `The file has version ${version}; this program reads up to version ${VERSION}.`,
      remedy: 'Open it with a newer version of this program.',
    });
  }
  let raised = file;
  for (let at = version; at <= VERSION; at++) {
    const step = steps.get(at);
    if (step === undefined) {
      return bad({
        where,
        what: `Version ${at} of the file is not known.`,
        remedy: `Known: ${[...steps.keys()].join(', ')}.`,
      });
    }
    raised = step(raised);
  }
  return good({ ...raised, version: VERSION });
}
