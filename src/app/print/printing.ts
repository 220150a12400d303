import type { Theme } from '../../drawing/palette.ts';
import { pageToSvg, printStyle } from '../../report/pages/document.ts';
import type { PrintedPage } from '../../report/pages/pages.ts';

/** An SVG text as an element of this page. */
export function svgElement(svg: string): Element {
  return document.importNode(new DOMParser().parseFromString(svg, 'image/svg+xml').documentElement, true);
}

/** Everything but the sheets is left out of print, and each sheet has a paper of its own. */
const RULES = `
.printed { display: none; font-feature-settings: normal; font-variant-numeric: normal; }
@media print {
  :root { color-scheme: light !important; }
  html, body { height: auto !important; overflow: visible !important; background: none !important; }
  body > :not(.printed) { display: none !important; }
  .printed { display: block; }
  .printed > svg { display: block; break-after: page; break-inside: avoid; }
  .printed > svg:last-child { break-after: auto; }
}`;

let last: (() => void) | undefined;

/** Lays the sheets out for print; the function given back takes them away again. */
export function layOut(pages: readonly PrintedPage[], theme: Theme | 'print' = 'print'): () => void {
  last?.();
  const host = document.createElement('div');
  host.className = 'printed';
  host.append(
    ...pages.map((page, i) => svgElement(pageToSvg(page, { theme, standalone: false, ids: `sheet-${i + 1}-` }))),
  );
  const style = document.createElement('style');
  const [first] = pages;
  style.textContent = `${first ? printStyle(first) : ''}${RULES}`;
  document.head.append(style);
  document.body.append(host);
  const clear = (): void => {
    host.remove();
    style.remove();
    if (last === clear) last = undefined;
  };
  last = clear;
  return clear;
}

/** Hands the sheets to the browser's print dialog. */
export function printPages(pages: readonly PrintedPage[], theme: Theme | 'print' = 'print'): void {
  const clear = layOut(pages, theme);
  window.addEventListener('afterprint', clear, { once: true });
  window.print();
}
