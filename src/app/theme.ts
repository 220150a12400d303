import { cssVariables, PENS } from '../drawing/palette.ts';
import type { PenStyle } from '../drawing/palette.ts';
import { MODULE_PX } from '../drawing/strokes.ts';
import './theme.css';
import './draw/fills.css';

/** Pens in modules, so that symbols keep their proportions at any zoom. */
function penRule([name, pen]: readonly [string, PenStyle]): string {
  const dash = pen.dash ? `stroke-dasharray:${pen.dash.map((px) => px / MODULE_PX).join(' ')};` : '';
  return `.pen-${name}{stroke:var(--${pen.colour});stroke-width:${pen.weight / MODULE_PX};${dash}}`;
}

/** The palette that exported drawings use too, as custom properties of the page. */
export function installTheme(): void {
  const style = document.createElement('style');
  style.textContent = [
    `:root{${cssVariables('light')}}`,
    `:root[data-theme='dark']{${cssVariables('dark')}}`,
    ...Object.entries(PENS).map(penRule),
  ].join('\n');
  document.head.append(style);
}
