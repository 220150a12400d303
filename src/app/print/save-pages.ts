import { MODULE_MM } from '../../drawing/frame.ts';
import type { Scene } from '../../drawing/scene.ts';
import { pageToSvg } from '../../report/pages/document.ts';
import type { PrintedPage } from '../../report/pages/pages.ts';
import { writePartListCsv } from '../../report/part-list.ts';
import { sceneToSvg } from '../../report/svg.ts';
import { download, fileStem } from '../files/save.ts';
import { drawing } from '../sheet/sheet-drawing.svelte.ts';
import { editor } from '../state/editor.svelte.ts';
import { notices } from '../state/notices.svelte.ts';
import type { Choices } from './choice.svelte.ts';
import { drawnScenes } from './pages.ts';
import { fontStyle, pngOf } from './picture.ts';

const stem = (): string => fileStem(editor.circuit.name);

/** Each sheet as a file of its own; SVG keeps its texts as texts, with the typeface inside. */
export async function savePages(pages: readonly PrintedPage[], form: 'svg' | 'png', choices: Choices): Promise<void> {
  const style = await fontStyle();
  for (const [i, page] of pages.entries()) {
    const name = `${stem()}${pages.length > 1 ? `-sheet-${i + 1}` : ''}.${form}`;
    const svg = pageToSvg(page, { theme: choices.look, standalone: true, style });
    const { width, height } = page.frame;
    if (form === 'svg') download(name, svg, 'image/svg+xml');
    else if (!(await savePng(name, svg, width * MODULE_MM, height * MODULE_MM, choices.dpi))) return;
  }
}

async function savePng(name: string, svg: string, width: number, height: number, dpi: number): Promise<boolean> {
  try {
    download(name, await pngOf(svg, width, height, dpi), 'image/png');
    return true;
  } catch (error) {
    notices.say({
      level: 'error',
      title: `${name} was not made`,
      text: error instanceof Error ? error.message : String(error),
    });
    return false;
  }
}

/** Free space round a drawing without a frame, in modules. */
const MARGIN = 3;

/** The drawings by themselves, without frame: a file for each sheet, its references named by the sheet alone. */
function* drawings(how: 'row' | 'plain'): Generator<{ readonly name: string; readonly scene: Scene }> {
  const scenes = drawnScenes(how);
  for (const [i, scene] of scenes.entries()) {
    const several = scenes.length > 1;
    yield {
      name: `${stem()}${several ? `-sheet-${i + 1}` : ''}`,
      scene: several ? drawing.zoned(scene, () => '') : scene,
    };
  }
}

export async function saveDrawingPng(
  how: 'row' | 'plain',
  theme: 'light' | 'dark',
  dpi: Choices['dpi'],
): Promise<void> {
  const style = await fontStyle();
  for (const { name, scene } of drawings(how)) {
    const svg = sceneToSvg(scene, { theme, standalone: true, margin: MARGIN, style });
    const [width, height] = [scene.bounds.width, scene.bounds.height].map((m) => (m + 2 * MARGIN) * MODULE_MM) as [
      number,
      number,
    ];
    if (!(await savePng(`${name}.png`, svg, width, height, dpi))) return;
  }
}

export async function saveDrawingSvg(how: 'row' | 'plain', theme: 'light' | 'dark'): Promise<void> {
  const style = await fontStyle();
  for (const { name, scene } of drawings(how))
    download(`${name}.svg`, sceneToSvg(scene, { theme, standalone: true, style }), 'image/svg+xml');
}

export const savePartList = (): void =>
  download(`${stem()}-parts.csv`, [...writePartListCsv(editor.circuit)].join(''), 'text/csv');
