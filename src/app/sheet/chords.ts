/** A key with its modifiers, as people write it: `Ctrl+Shift+Z`, `Delete`, `+`, `F2`, `Space`. */
export type Chord = string;

/** What of a keyboard event counts. */
export interface KeyPress {
  readonly key: string;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly shiftKey: boolean;
  readonly altKey: boolean;
}

interface Parsed {
  readonly key: string;
  readonly ctrl: boolean;
  readonly shift: boolean;
  readonly alt: boolean;
}

function parse(chord: Chord): Parsed {
  // A lone `+`, or one after modifiers, is the key itself.
  const plus = chord.endsWith('+');
  const parts = (plus ? chord.slice(0, -1) : chord).split('+').filter((part) => part !== '');
  const key = plus ? '+' : (parts.pop() ?? '');
  return { key, ctrl: parts.includes('Ctrl'), shift: parts.includes('Shift'), alt: parts.includes('Alt') };
}

/** Command on a Mac counts as Ctrl. Shift counts only with letters and named keys: `+` needs it on some keyboards. */
export function matches(chord: Chord, press: KeyPress): boolean {
  const { key, ctrl, shift, alt } = parse(chord);
  if (ctrl !== (press.ctrlKey || press.metaKey) || alt !== press.altKey) return false;
  const pressed = press.key === ' ' ? 'Space' : press.key;
  if (key.length === 1 && !/[a-z]/i.test(key)) return pressed === key;
  return pressed.toLowerCase() === key.toLowerCase() && shift === press.shiftKey;
}

/** Words for the Keys panel: arrows as arrows. */
export const sayChord = (chord: Chord): string =>
  chord
    .replace(/(Ctrl|Alt|Shift)\+/g, '$1 ')
    .replace('ArrowLeft', '←')
    .replace('ArrowRight', '→')
    .replace('ArrowUp', '↑')
    .replace('ArrowDown', '↓')
    .replace('Delete', 'Del');
