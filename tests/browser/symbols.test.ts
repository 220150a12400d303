import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import type { Page } from 'playwright-core';
import { advance } from '../../src/base/text-advance.ts';
import { FONT_FAMILY, PALETTE } from '../../src/drawing/palette.ts';
import type { Theme } from '../../src/drawing/palette.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { buildScene } from '../../src/drawing/scene.ts';
import { sceneToSvg } from '../../src/report/svg.ts';
import { specimens, STANDS, standing } from '../drawing/specimens.ts';
import type { Specimen } from '../drawing/specimens.ts';
import { exampleSheets } from '../drawing/some-sheets.ts';
import { openEditor, shot } from './harness.ts';

/**
 * Every symbol in every turn, and every example, as pages of pictures to be looked at (`SHOTS=folder`), in both themes. What
 * a picture cannot fail on is measured: letters take the room in the browser that places for them reckon with.
 */
const FONT = new URL(
  '../../node_modules/@fontsource-variable/inter/files/inter-latin-wght-normal.woff2',
  import.meta.url,
);
const PER_PAGE = 12;

const turned = (specimen: Specimen, theme: Theme): string =>
  STANDS.map((stand) => {
    const circuit = standing(specimen, stand, { x: 0, y: 0 });
    const scene = buildScene(circuit, routeAll(circuit), { parts: new Map([['S', specimen.look]]) });
    return sceneToSvg(scene, { theme, standalone: false, margin: 1.5 });
  }).join('');

async function show(
  page: Page,
  theme: Theme,
  rows: readonly { readonly name: string; readonly drawn: string }[],
): Promise<void> {
  const font = readFileSync(FONT).toString('base64');
  const { paper, ink } = PALETTE[theme];
  const face = `@font-face { font-family: 'Inter Variable'; src: url(data:font/woff2;base64,${font}); font-weight: 100 900 }`;
  const style = `${face} body { background: ${paper}; color: ${ink}; font: 12px ${FONT_FAMILY}; margin: 8px; width: max-content }
    section { border-top: 1px solid; padding: 4px 0 } div { display: flex; gap: 16px; align-items: center }`;
  const body = rows.map(({ name, drawn }) => `<section>${name.replace(/[<&>]/g, '')}<div>${drawn}</div></section>`);
  await page.setContent(`<style>${style}</style>${body.join('')}`);
  await page.evaluate(() => document.fonts.ready);
  const { width, height } = await page.evaluate(() => ({
    width: document.documentElement.scrollWidth,
    height: document.documentElement.scrollHeight,
  }));
  await page.setViewportSize({ width, height });
}

/** What is measured is alike in both; the dark one is for whoever looks at the pictures. */
const THEMES: readonly Theme[] = process.env['SHOTS'] ? ['light', 'dark'] : ['light'];

test.each(THEMES)(
  'every symbol in every turn, %s',
  async (theme) => {
    const page = await openEditor({ address: 'about:blank' });
    // Positions and choices once; the second theme is for colours.
    const all = specimens().filter(({ look }) => theme === 'light' || Object.keys(look).length === 0);
    for (let first = 0; first < all.length; first += PER_PAGE) {
      const rows = all
        .slice(first, first + PER_PAGE)
        .map((each) => ({ name: `${each.part.kind}: ${each.name}`, drawn: turned(each, theme) }));
      await show(page, theme, rows);
      expect(await page.locator('svg').count()).toBe(rows.length * STANDS.length);
      await shot(page, `symbols-${theme}-${String(first / PER_PAGE + 1).padStart(2, '0')}`);
    }
  },
  300_000,
);

test.each(THEMES)(
  'every example sheet, %s, and the room that its letters take',
  async (theme) => {
    const page = await openEditor({ address: 'about:blank' });
    for (const { name, circuit } of exampleSheets()) {
      const drawn = sceneToSvg(buildScene(circuit, routeAll(circuit)), { theme, standalone: false });
      await show(page, theme, [{ name, drawn }]);
      await shot(page, `sheet-${theme}-${name.replace(/\W+/g, '-')}`);
      const texts = await page.evaluate(() =>
        [...document.querySelectorAll('svg > g > text, svg > text > tspan')].map((each) => ({
          text: each.textContent ?? '',
          size: Number(each.getAttribute('font-size')),
          weight: Number(each.getAttribute('font-weight')),
          width: (each as SVGTextContentElement).getComputedTextLength(),
        })),
      );
      expect(texts.length).toBeGreaterThan(5);
      for (const { text, size, weight, width } of texts) {
        // Kerning makes some pairs a hair narrower.
        const reckoned = advance(text, size, weight === 600 ? 600 : weight === 500 ? 500 : 400);
        expect([text, width <= reckoned * 1.04 + 0.05, width >= reckoned * 0.93]).toEqual([text, true, true]);
      }
    }
  },
  300_000,
);
