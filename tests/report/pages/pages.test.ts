import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Primitive } from '../../../src/base/primitives.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { PAPERS } from '../../../src/circuit/paper.ts';
import { faceOf, referencesOf, withZones } from '../../../src/drawing/faces.ts';
import { fieldAt } from '../../../src/drawing/frame.ts';
import { placeMissing } from '../../../src/drawing/place.ts';
import { routeAll } from '../../../src/drawing/routing.ts';
import { buildScene } from '../../../src/drawing/scene.ts';
import { advance } from '../../../src/base/text-advance.ts';
import { openCircuit } from '../../../src/parts/open.ts';
import { writePartListCsv } from '../../../src/report/part-list.ts';
import { writePrintDocument, pageToSvg } from '../../../src/report/pages/document.ts';
import { flow } from '../../../src/report/pages/flow.ts';
import { hasRoomBeside, joined, printedPages } from '../../../src/report/pages/pages.ts';
import type { PrintedPage } from '../../../src/report/pages/pages.ts';
import {
  chartSection,
  findingsSection,
  MOST_PRINTED_ROWS,
  notesSection,
  partListBlock,
} from '../../../src/report/pages/sections.ts';
import { makeReport } from '../../../src/report/rows.ts';
import { unplacedRig } from '../../drawing/samples.ts';
import { sampleTable } from '../sample.ts';

const flat = (primitives: readonly Primitive[]): Primitive[] =>
  primitives.flatMap((p) => (p.type === 'group' ? flat(p.children) : [p]));
const texts = (page: Pick<PrintedPage, 'primitives'>): string[] =>
  flat(page.primitives).flatMap((p) => (p.type === 'text' ? [p.text] : []));

const circuit: Circuit = { ...placeMissing(unplacedRig()), title: { machine: 'Rig', number: 'HY-9' } };
const scene = buildScene(circuit, routeAll(circuit));
const positions = Array.from({ length: 70 }, (_, i) => `p${i}`);
const report = makeReport({
  version: '0',
  circuit,
  conditions: { pumps: 'running' },
  table: sampleTable({
    inputs: [
      { label: 'V1', positions, rest: 0, coils: [] },
      { label: 'V2', positions: ['a', 'b'], rest: 0, coils: [] },
    ],
    actuators: { C1: positions.flatMap(() => ['extends', 'held']) },
  }),
  findings: [],
});

test.each(PAPERS)(
  'on %s the chart has its head, a title block and its number on every sheet, and no row is lost',
  (paper) => {
    const pages = printedPages({
      circuit,
      paper,
      drawing: { scene, shows: 'Every valve at rest' },
      sections: [chartSection(report)],
    });
    const [, ...chart] = pages;
    expect(chart.length).toBeGreaterThan(0);
    pages.forEach((page, i) => {
      expect(texts(page)).toContain(`${i + 1} of ${pages.length}`);
      expect(texts(page)).toContain('HY-9');
    });
    for (const page of chart) expect(texts(page)).toEqual(expect.arrayContaining(['Row', 'V1', 'C1']));
    const rows = chart.flatMap(texts).filter((text) => /^p\d+$/.test(text));
    // Each position of V1 stands in two rows.
    expect(rows.filter((text) => text === 'p69')).toHaveLength(2);
    expect(rows).toHaveLength(140);
    for (const page of pages) {
      const { inside } = page.frame;
      for (const p of flat(page.primitives)) {
        if (p.type !== 'text' || p.align !== 'start') continue;
        expect(p.at.x + advance(p.text, p.size, p.weight)).toBeLessThanOrEqual(inside.x + inside.width + 1e-6);
      }
    }
  },
);

test('a drawing is never enlarged, keeps inside its frame, and says its fit', () => {
  for (const paper of PAPERS) {
    const [page] = printedPages({ circuit, paper, drawing: { scene, shows: '', key: true }, sections: [] });
    const placed = page?.scene;
    if (!page || !placed) throw new Error('no drawing');
    const { inside } = page.frame;
    expect(placed.scale).toBeLessThanOrEqual(1);
    const left = placed.at.x + scene.bounds.x * placed.scale;
    const bottom = placed.at.y + (scene.bounds.y + scene.bounds.height) * placed.scale;
    expect(left).toBeGreaterThanOrEqual(inside.x);
    expect(left + scene.bounds.width * placed.scale).toBeLessThanOrEqual(inside.x + inside.width);
    expect(bottom).toBeLessThanOrEqual(inside.y + inside.height);
    expect(texts(page).some((text) => text.startsWith(`${Math.round(placed.scale * 100)} %, M `))).toBe(true);
  }
});

test('a part list stands on the drawing where it has room, and is said to have none where not', () => {
  const list = partListBlock(circuit);
  expect(hasRoomBeside('A3 landscape', list)).toBe(true);
  const [page] = printedPages({
    circuit,
    paper: 'A3 landscape',
    drawing: { scene, shows: '', beside: list },
    sections: [],
  });
  expect(page && texts(page)).toEqual(expect.arrayContaining(['Item', 'Count', 'Fixed pump']));
  const long = { type: 'table', columns: [{ head: 'x' }], rows: Array.from({ length: 200 }, () => ['y']) } as const;
  expect(hasRoomBeside('A3 landscape', long)).toBe(false);
});

test('what is not printed of a long table is said first', () => {
  const long = {
    ...report,
    count: 90_000,
    *rows() {
      for (let i = 0; i < 90_000; i++) yield report.rowAt(i % 140);
    },
  };
  const { blocks } = chartSection(long);
  const table = blocks.find((block) => block.type === 'table');
  expect(table?.type === 'table' && table.rows).toHaveLength(MOST_PRINTED_ROWS);
  expect(JSON.stringify(blocks[1])).toContain('first 2,000 rows; 88,000 more are not');
});

test('a heading never ends a sheet, and nothing is drawn below a column however the pieces fall', () => {
  fc.assert(
    fc.property(
      fc.array(fc.nat({ max: 30 }), { maxLength: 12 }),
      fc.integer({ min: 8, max: 20 }),
      (lengths, height) => {
        const blocks = lengths.flatMap((length, i) => [
          { type: 'heading', text: `Head ${i}`, level: 2 } as const,
          { type: 'text', text: 'word '.repeat(length) + 'end' } as const,
        ]);
        const column = { x: 0, y: 0, width: 20, height };
        const sheets = flow(blocks, () => [column]);
        for (const { primitives, ends } of sheets) {
          expect(Math.max(...ends)).toBeLessThanOrEqual(height + 1e-6);
          const last = primitives.at(-1);
          expect(last?.type === 'text' && last.text.startsWith('Head')).toBe(false);
        }
        const heads = sheets.flatMap(({ primitives }) =>
          primitives.filter((p) => p.type === 'text' && p.text.startsWith('Head')),
        );
        expect(heads).toHaveLength(lengths.length);
      },
    ),
    { numRuns: 60 },
  );
});

test('notes keep their lines, no notes make no section, and sections are joined into one', () => {
  expect(notesSection({ ...circuit, notes: ' \n' })).toBeUndefined();
  const notes = notesSection({ ...circuit, notes: 'One\n\nTwo' });
  if (!notes) throw new Error('no notes');
  const [both, ...none] = joined([notes, findingsSection([])]);
  expect([both?.document, none]).toEqual(['Notes, findings', []]);
  expect(JSON.stringify(both?.blocks)).toContain('None of the design faults');
  expect(joined([])).toEqual([]);
});

test('a sheet is an SVG in mm that needs nothing else, and texts say how long they are', () => {
  const [page] = printedPages({
    circuit,
    paper: 'A3 landscape',
    drawing: { scene, shows: '', key: true },
    sections: [],
  });
  if (!page) throw new Error('no sheet');
  const svg = pageToSvg(page, { theme: 'print', standalone: true });
  expect(svg).toContain('width="420mm" height="297mm"');
  expect(svg).not.toMatch(/href|url\((?!#)|<style|class=/);
  expect(svg).toMatch(/textLength="[\d.]+" lengthAdjust="spacingAndGlyphs">HY-9</);
  // Black on white: no tint of colour is left.
  const colours = new Set([...svg.matchAll(/#[0-9A-Fa-f]{6}/g)].map(([hex]) => hex));
  for (const hex of colours)
    expect(hex.slice(1, 3) === hex.slice(3, 5) && hex.slice(3, 5) === hex.slice(5, 7)).toBe(true);
  expect(pageToSvg(page, { theme: 'print', standalone: true, style: '@font-face{}' })).toContain(
    '<style>@font-face{}</style>',
  );
});

test('a print document has a paper for each sheet and no id twice', () => {
  const pages = printedPages({ circuit, drawing: { scene, shows: '' }, sections: [chartSection(report)] });
  const html = [...writePrintDocument('A & B', pages)].join('');
  expect(html).toContain('@page{size:420mm 297mm;margin:0}');
  expect(html).toContain('<title>A &amp; B</title>');
  expect(html.match(/<svg /g)).toHaveLength(pages.length);
  const ids = [...html.matchAll(/ id="([^"]+)"/g)].map(([, id]) => id);
  expect(new Set(ids).size).toBe(ids.length);
  for (const [, id] of html.matchAll(/url\(#([^)]+)\)/g)) expect(ids).toContain(id);
});

test('each sheet of a circuit is a page with its own name, and references name pages and fields of the frame', () => {
  const press = openCircuit(readFileSync(new URL('../../../examples/tile-press.spool.json', import.meta.url), 'utf8'));
  if (!press.ok) throw new Error('the example cannot be read');
  const references = referencesOf(press.value);
  const pages = printedPages({
    circuit: press.value,
    drawing: (press.value.sheets ?? []).map(({ id, name }) => {
      const face = faceOf(press.value, id, references, () => '');
      const drawn = buildScene(face, routeAll(face));
      return {
        scene: drawn,
        shows: 'Every valve at rest',
        one: { id, name, zoned: (zoneOf) => withZones(drawn, press.value, references, zoneOf) },
      };
    }),
    sections: [],
  });
  expect(pages.map(({ title }) => title)).toEqual([
    'Tile press, two sheets, sheet 1 of 2',
    'Tile press, two sheets, sheet 2 of 2',
  ]);
  expect(pages.map(texts).map((words) => words.filter((word) => /at rest$/.test(word)))).toEqual([
    ['Power unit. Every valve at rest'],
    ['Stations. Every valve at rest'],
  ]);
  let checked = 0;
  for (const page of pages) {
    for (const part of page.scene?.scene.parts ?? []) {
      const there = references.get(references.get(part.id)?.other ?? '');
      if (!there) continue;
      const number = there.sheet === 's1' ? 0 : 1;
      const target = pages[number];
      const placed = target?.scene;
      if (!target || !placed) throw new Error('the other page is not there');
      const field = fieldAt(target.frame, {
        x: placed.at.x + there.at.x * placed.scale,
        y: placed.at.y + there.at.y * placed.scale,
      });
      expect(texts(part)).toContain(`${number + 1}/${field}`);
      checked++;
    }
  }
  expect(checked).toBe(6);
});

test('the part list of a circuit on several sheets names them', () => {
  const sheets = [
    { id: 's1', name: 'One' },
    { id: 's2', name: 'Two' },
  ];
  const parts: Circuit['parts'] = [
    { id: 'G1', kind: 'gauge' },
    { id: 'G2', kind: 'gauge', sheet: 's2' },
    { id: 'F1', kind: 'filter', sheet: 's2' },
  ];
  expect([...writePartListCsv({ name: 'L', sheets, parts, connections: [] })].join('')).toBe(
    'Item,Code,Label,Part,Data,Sheet,Count\r\n1,,"G1, G2",Pressure gauge,,"1, 2",2\r\n2,,F1,Filter,,2,1\r\n',
  );
});
