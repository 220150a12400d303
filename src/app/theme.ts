import { cssVariables, FILLS, PENS } from '../drawing/palette.ts';
import type { PenStyle } from '../drawing/palette.ts';
import { MODULE_PX } from '../drawing/strokes.ts';
import './theme.css';
import './shared.css';
import './draw/tones.css';

/** Pens in modules, so that symbols keep their proportions at any zoom. */
function penRule([name, pen]: readonly [string, PenStyle]): string {
  const dash = pen.dash ? `stroke-dasharray:${pen.dash.map((px) => px / MODULE_PX).join(' ')};` : '';
  return `.pen-${name}{stroke:var(--${pen.colour});stroke-width:${pen.weight / MODULE_PX};${dash}}`;
}

const fillRule = ([name, token]: readonly [string, string]): string =>
  `.fill-${name}{fill:${token === 'none' ? 'none' : `var(--${token})`};}`;

/** The palette that exported drawings use too, as custom properties of the page. */
export function installTheme(): void {
  const style = document.createElement('style');
  style.textContent = [
    `:root{${cssVariables('light')}}`,
    `:root[data-theme='dark']{${cssVariables('dark')}}`,
    ...Object.entries(PENS).map(penRule),
    ...Object.entries(FILLS).map(fillRule),
  ].join('\n');
  document.head.append(style);
}
