import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Circuit } from '../../src/circuit/model.ts';
import { PALETTE } from '../../src/drawing/palette.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { buildScene } from '../../src/drawing/scene.ts';
import type { Scene } from '../../src/drawing/scene.ts';
import { escapeXml, sceneToSvg } from '../../src/report/svg.ts';
import { unplacedRig } from '../drawing/samples.ts';

/** Names of the elements in order; throws where tags, attributes or entities are not well formed (XML 1.0). */
function elementsOf(xml: string): string[] {
  const names: string[] = [];
  const open: string[] = [];
  let rest = xml.replace(/^<\?xml version="1\.0" encoding="UTF-8"\?>\n/, '');
  while (rest.length > 0) {
    const text = /^[^<]+/.exec(rest)?.[0];
    if (text !== undefined) {
      if (/&(?!(amp|lt|gt|quot|#39);)/.test(text) || text.includes(']]>')) throw new Error(`bad text ${text}`);
      if (open.length === 0 && text.trim() !== '') throw new Error('text outside the root');
      rest = rest.slice(text.length);
      continue;
    }
    const close = /^<\/([a-zA-Z]+)>/.exec(rest);
    if (close) {
      if (open.pop() !== close[1]) throw new Error(`unmatched ${close[0]}`);
      rest = rest.slice(close[0].length);
      continue;
    }
    const tag = /^<([a-zA-Z]+)((?: [a-zA-Z:-]+="[^"<]*")*)(\/?)>/.exec(rest);
    if (!tag) throw new Error(`bad tag at ${rest.slice(0, 60)}`);
    const attributes = [...(tag[2] ?? '').matchAll(/ ([a-zA-Z:-]+)="([^"]*)"/g)];
    if (new Set(attributes.map((a) => a[1])).size !== attributes.length)
      throw new Error(`doubled attribute in ${tag[0]}`);
    for (const [, , value] of attributes)
      if (/&(?!(amp|lt|gt|quot|#39);)/.test(value ?? '')) throw new Error(`bad value ${value}`);
    names.push(tag[1] as string);
    if (tag[3] === '') open.push(tag[1] as string);
    rest = rest.slice(tag[0].length);
  }
  if (open.length > 0) throw new Error(`not closed: ${open.join(' ')}`);
  return names;
}

const sceneOf = (circuit: Circuit): Scene => {
  const placed = placeMissing(circuit);
  return buildScene(placed, routeAll(placed), {
    lines: new Map(
      placed.connections.map((c, i) => [
        c.id,
        { class: i % 2 === 0 ? 'fed' : 'cut off', ...(i % 3 === 0 && { trapped: 'known' }) },
      ]),
    ),
    parts: new Map([['V1', { position: 0, note: 'out' }]]),
  });
};
const rig = sceneOf(unplacedRig());

test('the checker itself refuses what is not well formed', () => {
  for (const bad of ['<a><b></a></b>', '<a b="1" b="2"/>', '<a>&nope;</a>', '<a b="<"/>', '<a', '<a>', 'x<a/>'])
    expect(() => elementsOf(bad)).toThrow();
  expect(elementsOf('<a b="1"><c/>x &amp; y</a>')).toEqual(['a', 'c']);
});

test.each(['light', 'dark'] as const)(
  'the rig in %s is well-formed, on its paper, with title and description',
  (theme) => {
    const svg = sceneToSvg(rig, { theme, standalone: true });
    const names = elementsOf(svg);
    expect(names.slice(0, 4)).toEqual(['svg', 'title', 'desc', 'rect']);
    expect(svg).toContain('<title>Clamp and feed</title>');
    // 16 connections, of which the four at the pump outlet are one line.
    expect(svg).toContain('<desc>14 parts, 13 lines.</desc>');
    expect(svg).toContain(`fill="${PALETTE[theme].paper}"`);
  },
);

test('any viewer can show it: no variables, classes, style sheets, scripts or anything to fetch', () => {
  const svg = sceneToSvg(rig, { theme: 'light', standalone: true });
  expect(svg).not.toMatch(/var\(|class=|<style|<script|href|url\((?!#)|NaN|undefined|Infinity/);
  expect(svg).toContain('xmlns="http://www.w3.org/2000/svg"');
  const colours = new Set([...svg.matchAll(/(?:fill|stroke)="([^"]+)"/g)].map((m) => m[1]));
  for (const colour of colours) expect(['none', ...Object.values(PALETTE.light)]).toContain(colour);
});

test('the view holds the whole drawing with its margin', () => {
  const svg = sceneToSvg(rig, { theme: 'light', standalone: true, margin: 2 });
  const [x, y, width, height] = (/viewBox="([^"]+)"/.exec(svg)?.[1] ?? '').split(' ').map(Number);
  expect(x).toBeCloseTo(rig.bounds.x - 2, 2);
  expect(y).toBeCloseTo(rig.bounds.y - 2, 2);
  expect(width).toBeCloseTo(rig.bounds.width + 4, 2);
  expect(height).toBeCloseTo(rig.bounds.height + 4, 2);
  expect(Number(/<svg[^>]* width="([\d.]+)"/.exec(svg)?.[1])).toBeCloseTo((rig.bounds.width + 4) * 8, 2);
});

test('text from the circuit stays text', () => {
  const evil = `"><script>alert('x')</script>&`;
  const base = unplacedRig();
  const svg = sceneToSvg(
    sceneOf({
      ...base,
      name: evil,
      parts: base.parts.map((p) => (p.id === 'C1' ? { ...p, label: evil, code: evil } : p)),
      labels: [{ id: 'n', at: { x: 0, y: 0 }, text: evil }],
    }),
    { theme: 'light', standalone: true, description: evil },
  );
  expect(elementsOf(svg)).not.toContain('script');
  expect(svg.split(escapeXml(evil)).length - 1).toBeGreaterThanOrEqual(5);
});

test('any text escapes to well-formed text that reads back the same, save what XML forbids', () => {
  const back = (s: string): string =>
    s
      .replace(/&lt;/g, '<')
      .replace(/&gt;/g, '>')
      .replace(/&quot;/g, '"')
      .replace(/&#39;/g, "'")
      .replace(/&amp;/g, '&');
  fc.assert(
    fc.property(fc.string({ unit: 'grapheme' }), (text) => {
      expect(elementsOf(`<a b="${escapeXml(text)}">${escapeXml(text)}</a>`)).toEqual(['a']);
      const allowed = [...text].filter((c) => c >= ' ' || '\t\n\r'.includes(c)).join('');
      expect(back(escapeXml(text))).toBe(allowed);
    }),
  );
  expect(escapeXml('a\u0000b\u0007\uffffc\ud800')).toBe('abc');
});

test('set into a page it has neither prologue nor paper', () => {
  const svg = sceneToSvg(rig, { theme: 'light', standalone: false });
  expect(svg.startsWith('<svg ')).toBe(true);
  expect(elementsOf(svg)[3]).not.toBe('rect');
});

test('equal scenes give equal files', () => {
  expect(sceneToSvg(sceneOf(unplacedRig()), { theme: 'light', standalone: true })).toBe(
    sceneToSvg(rig, { theme: 'light', standalone: true }),
  );
});
