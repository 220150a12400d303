import { EXAMPLES } from './examples.ts';
import { openText } from './open.ts';

export function openDemo(): void {
  const [demo] = EXAMPLES;
  if (demo) openText(demo.text, { name: undefined });
}
