import { MODULE_MM } from '../../drawing/frame.ts';
import { escapeXml, sheetToSvg } from '../svg.ts';
import type { SheetOptions } from '../svg.ts';
import type { PrintedPage } from './pages.ts';

/** One sheet as SVG in the size of its paper. */
export const pageToSvg = ({ frame, ...page }: PrintedPage, options: SheetOptions): string =>
  sheetToSvg({ ...page, width: frame.width, height: frame.height, module: MODULE_MM }, options);

/** What a browser has to know to put each sheet on a paper of its own, without margins of its own. */
export function printStyle(page: PrintedPage): string {
  const { width, height } = sizeOf(page);
  return `@page{size:${width} ${height};margin:0}`;
}

const sizeOf = ({ frame }: PrintedPage): { readonly width: string; readonly height: string } => ({
  width: `${Math.round(frame.width * MODULE_MM * 100) / 100}mm`,
  height: `${Math.round(frame.height * MODULE_MM * 100) / 100}mm`,
});

/** All sheets as one web page that prints as it stands; nothing is fetched. */
export function* writePrintDocument(title: string, pages: readonly PrintedPage[]): Generator<string> {
  const [first] = pages;
  const style = [
    first ? printStyle(first) : '',
    'body{margin:0;background:#ddd}',
    'svg{display:block;margin:0 auto 8mm;background:#fff}',
    '@media print{body{background:none}svg{margin:0;break-after:page;break-inside:avoid}svg:last-of-type{break-after:auto}}',
  ].join('\n');
  yield `<!doctype html>\n<html lang="en">\n<head>\n<meta charset="utf-8">\n<title>${escapeXml(title)}</title>\n<style>\n${style}\n</style>\n</head>\n<body>\n`;
  for (const [i, page] of pages.entries())
    yield pageToSvg(page, { theme: 'print', standalone: false, ids: `sheet-${i + 1}-` });
  yield '</body>\n</html>\n';
}
