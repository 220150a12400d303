import { MODULE_PX } from '../../drawing/strokes.ts';

const widths = new Map<string, number>();
let pen: CanvasRenderingContext2D | null | undefined;

/** Width of a text in modules, `size` in pixels at 8 px a module, as this browser sets it. */
export function measure(text: string, size: number, weight: number): number {
  const key = `${weight} ${size} ${text}`;
  const known = widths.get(key);
  if (known !== undefined) return known;
  pen ??= document.createElement('canvas').getContext('2d');
  if (!pen) return (text.length * size * 0.58) / MODULE_PX;
  pen.font = `${weight} ${size}px 'Inter Variable', Inter, system-ui, sans-serif`;
  const width = pen.measureText(text).width / MODULE_PX;
  // Before the font has come, widths are those of another one: do not keep them.
  if (document.fonts.check(pen.font)) widths.set(key, width);
  return width;
}
