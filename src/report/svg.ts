import type { Box, Point } from '../base/points.ts';
import type { Fill, Pen, Primitive } from '../base/primitives.ts';
import type { SceneLabel } from '../drawing/labels.ts';
import type { ColourToken, Theme } from '../drawing/palette.ts';
import { FILLS, FONT_FAMILY, PALETTE, PENS, PRINT } from '../drawing/palette.ts';
import type { Scene } from '../drawing/scene.ts';
import type { Stroke } from '../drawing/strokes.ts';
import { MODULE_PX, pathData } from '../drawing/strokes.ts';
import { advance, isMeasured } from '../base/text-advance.ts';

export interface SvgOptions {
  /** `print`: black on white. */
  readonly theme: Theme | 'print';
  /** With its own name space, size and paper: a file of its own. Otherwise an `svg` element to set into a page. */
  readonly standalone: boolean;
  /** Free space round the drawing, in modules; 3 when absent. */
  readonly margin?: number;
  /** What a reader who cannot see it is told; the circuit's size when absent. */
  readonly description?: string;
  /** Text of a style element, such as a typeface to carry along. */
  readonly style?: string;
}

/** A sheet of paper: what lies on it in its own modules, and a drawing set into it. */
export interface SvgSheet {
  readonly title: string;
  readonly description: string;
  /** In modules, and of one module in mm. */
  readonly width: number;
  readonly height: number;
  readonly module: number;
  readonly primitives: readonly Primitive[];
  readonly strokes: readonly Stroke[];
  readonly scene?: { readonly scene: Scene; readonly at: Point; readonly scale: number };
}

const JOINT_RADIUS = 0.36;
const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Safe in text and in attributes; characters that XML 1.0 forbids are left out. */
export const escapeXml = (text: string): string =>
  [...text]
    .filter(allowedInXml)
    .join('')
    .replace(/[&<>"']/g, (c) => ENTITIES[c] as string);

function allowedInXml(c: string): boolean {
  const code = c.codePointAt(0) as number;
  if (code < 0x20) return code === 9 || code === 10 || code === 13;
  return !(code >= 0xd800 && code <= 0xdfff) && code !== 0xfffe && code !== 0xffff;
}

/** The scene as SVG text: plain colours, no style sheet, no script, nothing fetched; any viewer shows it. */
export function sceneToSvg(scene: Scene, options: SvgOptions): string {
  const pen = new Writer(options.theme, options.standalone);
  const counts = `${scene.parts.length} parts, ${new Set(scene.lines.map((l) => l.line)).size} lines.`;
  return svgElement(scene.title, options.description ?? counts, scene.bounds, options, pen, sceneElements(scene, pen));
}

const sceneElements = (scene: Scene, pen: Writer): string[] => [
  ...scene.blocks.map((b) => pen.group('', b.primitives)),
  ...scene.enclosures.map((e) => pen.group('', e.primitives)),
  ...scene.lines.map((l) => `<g>${l.strokes.map((s) => pen.stroke(s)).join('')}</g>`),
  ...scene.dots.map(
    (d) => `<circle cx="${num(d.at.x)}" cy="${num(d.at.y)}" r="${JOINT_RADIUS}" fill="${pen.colour('ink')}"/>`,
  ),
  ...scene.parts.map((p) => pen.group(`<title>${escapeXml(p.label)}</title>`, p.primitives)),
  ...scene.labels.map((l) => pen.label(l)),
];

export interface SheetOptions {
  readonly theme: SvgOptions['theme'];
  readonly standalone: boolean;
  /** Text of a style element, such as a typeface to carry along. */
  readonly style?: string;
  /** Stands before every id, where several sheets share one document. */
  readonly ids?: string;
}

/**
 * A sheet of paper as SVG text, its size in mm. Each text says how long it is in the typeface of the screen, so that another
 * typeface takes the same room.
 */
export function sheetToSvg(sheet: SvgSheet, { theme, standalone, style, ids }: SheetOptions): string {
  const pen = new Writer(theme, true, ids);
  const { width, height, module, scene } = sheet;
  const body = [
    `<title>${escapeXml(sheet.title)}</title>`,
    `<desc>${escapeXml(sheet.description)}</desc>`,
    ...(style === undefined ? [] : [`<style>${style}</style>`]),
    `<rect width="${num(width)}" height="${num(height)}" fill="${pen.colour('paper')}"/>`,
    ...(scene
      ? [
          `<g transform="translate(${xy(scene.at)}) scale(${num(scene.scale)})">`,
          ...sceneElements(scene.scene, pen),
          '</g>',
        ]
      : []),
    pen.group('', sheet.primitives),
    ...sheet.strokes.map((s) => pen.stroke(s)),
  ];
  const head = standalone ? '<?xml version="1.0" encoding="UTF-8"?>\n' : '';
  const size = `width="${num(width * module)}mm" height="${num(height * module)}mm"`;
  return `${head}<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${num(width)} ${num(height)}" ${size} role="img" font-family="${escapeXml(FONT_FAMILY)}">\n${body.join('\n')}\n</svg>\n`;
}

/** A list of primitives, such as a diagram, as SVG text of the same kind. `description` is what cannot be seen from the title. */
export function drawingToSvg(
  drawing: { readonly title: string; readonly bounds: Box; readonly primitives: readonly Primitive[] },
  options: SvgOptions & { readonly description: string },
): string {
  const pen = new Writer(options.theme);
  return svgElement(drawing.title, options.description, drawing.bounds, options, pen, [
    pen.group('', drawing.primitives),
  ]);
}

function svgElement(
  title: string,
  description: string,
  { x, y, width, height }: Box,
  options: SvgOptions,
  pen: Writer,
  drawn: readonly string[],
): string {
  const margin = options.margin ?? 3;
  const view = [x - margin, y - margin, width + 2 * margin, height + 2 * margin];
  const size = `width="${num((view[2] as number) * MODULE_PX)}" height="${num((view[3] as number) * MODULE_PX)}"`;
  const body = [
    `<title>${escapeXml(title)}</title>`,
    `<desc>${escapeXml(description)}</desc>`,
    ...(options.style === undefined ? [] : [`<style>${options.style}</style>`]),
    ...(options.standalone
      ? [
          `<rect x="${num(view[0])}" y="${num(view[1])}" width="${num(view[2])}" height="${num(view[3])}" fill="${pen.colour('paper')}"/>`,
        ]
      : []),
    ...drawn,
  ];
  const head = options.standalone ? '<?xml version="1.0" encoding="UTF-8"?>\n' : '';
  const open = `<svg xmlns="http://www.w3.org/2000/svg" viewBox="${view.map(num).join(' ')}" ${size} role="img" font-family="${escapeXml(FONT_FAMILY)}">`;
  return `${head}${open}\n${body.join('\n')}\n</svg>\n`;
}

const num = (v: number | undefined): string => String(Math.round((v ?? 0) * 1000) / 1000);
const xy = (p: Point): string => `${num(p.x)} ${num(p.y)}`;

class Writer {
  readonly #colours: Readonly<Record<ColourToken, string>>;
  readonly #measured: boolean;
  readonly #ids: string;
  #clips = 0;

  /** `measured`: texts say how long they are. `ids` stands before every id. */
  constructor(theme: SvgOptions['theme'], measured = false, ids = '') {
    this.#measured = measured;
    this.#ids = ids;
    this.#colours = theme === 'print' ? PRINT : PALETTE[theme];
  }

  colour(token: ColourToken): string {
    return this.#colours[token];
  }

  stroke(s: Stroke): string {
    const dash = s.dash ? ` stroke-dasharray="${s.dash.map((d) => num(d / MODULE_PX)).join(' ')}"` : '';
    const opacity = s.opacity === undefined ? '' : ` stroke-opacity="${num(s.opacity)}"`;
    return `<path d="${pathData(s.lines)}" fill="none" stroke="${this.colour(s.colour)}" stroke-width="${num(s.weight / MODULE_PX)}" stroke-linecap="${s.cap}"${dash}${opacity}/>`;
  }

  group(head: string, primitives: readonly Primitive[]): string {
    return `<g>${head}${primitives.map((p) => this.primitive(p)).join('')}</g>`;
  }

  primitive(p: Primitive): string {
    switch (p.type) {
      case 'polyline':
        return `<path d="${pathData([p.points], p.closed)}" ${this.#paint(p.pen, p.fill)}/>`;
      case 'circle':
        return `<circle cx="${num(p.centre.x)}" cy="${num(p.centre.y)}" r="${num(p.radius)}" ${this.#paint(p.pen, p.fill)}/>`;
      case 'arc': {
        const flags = `${p.large === true ? 1 : 0} ${(p.clockwise ?? true) ? 1 : 0}`;
        return `<path d="M${xy(p.from)}A${num(p.radius)} ${num(p.radius)} 0 ${flags} ${xy(p.to)}" ${this.#paint(p.pen, 'none')}/>`;
      }
      case 'box': {
        const corner = p.corner === undefined ? '' : ` rx="${num(p.corner)}"`;
        return `<rect x="${num(p.x)}" y="${num(p.y)}" width="${num(p.width)}" height="${num(p.height)}"${corner} ${this.#paint(p.pen, p.fill)}/>`;
      }
      case 'text':
        return `<text x="${num(p.at.x)}" y="${num(p.at.y)}" font-size="${num(p.size)}" text-anchor="${p.align}" font-weight="${p.weight ?? 400}" fill="${this.colour(p.tone ?? 'ink')}"${this.#length(p.text, p.size, p.weight)}>${escapeXml(p.text)}</text>`;
      case 'group': {
        const move = p.shift.x !== 0 || p.shift.y !== 0 ? ` transform="translate(${xy(p.shift)})"` : '';
        const inner = `<g${move}>${p.children.map((c) => this.primitive(c)).join('')}</g>`;
        if (!p.clip) return inner;
        const id = `${this.#ids}clip-${this.#clips++}`;
        const { x, y, width, height } = p.clip;
        const rect = `<rect x="${num(x)}" y="${num(y)}" width="${num(width)}" height="${num(height)}"/>`;
        return `<clipPath id="${id}">${rect}</clipPath><g clip-path="url(#${id})">${inner}</g>`;
      }
    }
  }

  label(l: SceneLabel): string {
    const runs = l.runs.map((r, i) => {
      const gap = i > 0 ? ` dx="${num((r.size * 0.5) / MODULE_PX)}"` : '';
      const assumed = r.assumed ? ' font-style="italic" text-decoration="underline"' : '';
      return `<tspan${gap}${assumed} font-size="${num(r.size / MODULE_PX)}" font-weight="${r.weight}" fill="${this.colour(r.tone)}"${this.#length(r.text, r.size / MODULE_PX, r.weight)}>${escapeXml(r.text)}</tspan>`;
    });
    return `<text x="${num(l.at.x)}" y="${num(l.at.y)}" text-anchor="${l.align}">${runs.join('')}</text>`;
  }

  #length(text: string, size: number, weight: 400 | 500 | 600 = 400): string {
    if (!this.#measured || text.trim() !== text || text.length < 2 || !isMeasured(text)) return '';
    return ` textLength="${num(advance(text, size, weight))}" lengthAdjust="spacingAndGlyphs"`;
  }

  #paint(pen: Pen, fill: Fill | undefined): string {
    const style = PENS[pen];
    const dash = style.dash ? ` stroke-dasharray="${style.dash.map((d) => num(d / MODULE_PX)).join(' ')}"` : '';
    return `fill="${this.#fill(fill)}" stroke="${this.colour(style.colour)}" stroke-width="${num(style.weight / MODULE_PX)}"${dash}`;
  }

  #fill(fill: Fill | undefined): string {
    const token = FILLS[fill ?? 'none'];
    return token === 'none' ? token : this.colour(token);
  }
}
