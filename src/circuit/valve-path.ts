import { bad, good, type Result } from '../base/result.ts';

/** One path inside a valve, as written. Two ports, or more that are all joined. */
export interface ValvePath {
  readonly ports: readonly string[];
  readonly way: 'both' | 'one-way';
  readonly throttled: boolean;
}

const REMEDY = 'Write P-A (open), P>A (one way), P~A (throttled), P~>A (throttled one way) or P-A-B (all joined).';
export const PORT_NAME = /^[A-Za-z][A-Za-z0-9_]*$/;

/** Reads the path notation of `ValvePosition.paths`; blanks do not matter. */
export function parsePath(text: string, where = 'path'): Result<ValvePath> {
  const clean = text.replace(/\s+/g, '');
  const signs = clean.match(/~>|[-~>]/g) ?? [];
  const ports = clean.split(/~>|[-~>]/);
  const wrong = ports.find((id) => !PORT_NAME.test(id));
  if (clean === '' || signs.length === 0 || wrong !== undefined) {
    return bad({ where, what: `"${text}" is not a path between ports.`, remedy: REMEDY });
  }
  const sign = signs[0] as string;
  if (signs.length > 1 && signs.some((other) => other !== '-')) {
    return bad({
      where,
      what: `"${text}" mixes signs or chains a one-way or throttled path.`,
      remedy: 'Write one path for each pair of ports.',
    });
  }
  const twice = ports.find((id, index) => ports.indexOf(id) !== index);
  if (twice !== undefined) {
    return bad({ where, what: `"${text}" names port ${twice} twice.`, remedy: 'Name each port of a path once.' });
  }
  return good({ ports, way: sign.endsWith('>') ? 'one-way' : 'both', throttled: sign.startsWith('~') });
}

/** The same in notation, without blanks. */
export function sayPath({ ports, way, throttled }: ValvePath): string {
  return ports.join(way === 'one-way' ? (throttled ? '~>' : '>') : throttled ? '~' : '-');
}
