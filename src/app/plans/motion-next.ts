import { sayMotion } from '../../worker/client.ts';
import type { Next } from '../../worker/client.ts';

interface Mover {
  readonly label: string;
  readonly rotary: boolean;
}

const OPEN = /[\s,;(]/;

/** How motions in trade notation may go on at the end of the text: what was begun is completed, else all motions. */
export function nextMotions(text: string, movers: readonly Mover[]): Next[] {
  const opened = text.lastIndexOf('(') > text.lastIndexOf(')');
  let from = text.length;
  while (from > 0 && !OPEN.test(text[from - 1] as string) && text[from - 1] !== ')') from -= 1;
  const begun = text.slice(from).toLowerCase();
  const used = begun === '' ? usedInStep(text) : [];
  const motions = movers.flatMap(({ rotary }, actuator) =>
    (rotary ? (['+', '-', '0'] as const) : (['+', '-'] as const)).map((way) => sayMotion({ actuator, way }, movers)),
  );
  const fitting = motions
    .filter((motion) => motion.toLowerCase().startsWith(begun) && motion.toLowerCase() !== begun)
    .filter((motion) => !used.includes(motion));
  return [
    ...fitting.map((motion): Next => ({ text: motion, from, kind: 'name' })),
    ...(begun !== ''
      ? []
      : opened
        ? [{ text: ')', from, kind: 'word' } as Next]
        : [{ text: '(', from, kind: 'word' } as Next]),
  ];
}

const usedInStep = (text: string): readonly string[] => text.split(/[\s,;()]+/).filter((each) => each !== '');
