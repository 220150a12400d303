import type { Primitive } from '../../base/primitives.ts';
import { lineMarks } from '../../drawing/line-marks.ts';
import type { LineLook, LineUse, Stroke } from '../../drawing/strokes.ts';
import type { Block } from './blocks.ts';
import { TEXT } from './blocks.ts';

const SAMPLES: readonly { readonly word: string; readonly look: LineLook; readonly use?: LineUse }[] = [
  { word: 'fed', look: { class: 'fed' } },
  { word: 'fed, dead end', look: { class: 'fed', blocked: true } },
  { word: 'flows to tank', look: { class: 'flows to tank', flow: 'forward' } },
  { word: 'vented', look: { class: 'vented' } },
  { word: 'cut off', look: { class: 'cut off' } },
  { word: 'trapped', look: { class: 'cut off', trapped: 'known' } },
  { word: 'trapped by heat', look: { class: 'cut off', trapped: 'possible' } },
  { word: 'displaced oil', look: { class: 'carries displaced oil' } },
  { word: 'pilot', look: { class: 'fed' }, use: 'pilot' },
  { word: 'drain', look: { class: 'vented' }, use: 'drain' },
];

/** What the marks of a shown state mean, as many samples side by side as the width takes. */
export function lineKey(width: number): Block {
  const cell = 15;
  const across = Math.max(1, Math.floor(width / cell));
  const primitives: Primitive[] = [];
  const strokes: Stroke[] = [];
  SAMPLES.forEach(({ word, look, use }, i) => {
    const x = (i % across) * cell;
    const y = 1 + Math.floor(i / across) * 2.1;
    const points = [
      { x, y },
      { x: x + 5, y },
    ];
    strokes.push(...lineMarks(points, look, use ?? 'working', { start: 0.8, end: 0.8 }));
    primitives.push({ type: 'text', at: { x: x + 5.8, y: y + 0.35 }, text: word, size: TEXT.table, align: 'start' });
  });
  const last = SAMPLES.length;
  const x = (last % across) * cell;
  const y = 1 + Math.floor(last / across) * 2.1;
  primitives.push(
    { type: 'text', at: { x: x + 2.5, y: y + 0.35 }, text: '14 bar', size: TEXT.table, align: 'middle', weight: 500 },
    {
      type: 'polyline',
      points: [
        { x: x + 0.9, y: y + 0.6 },
        { x: x + 4.1, y: y + 0.6 },
      ],
      pen: 'hair',
    },
    { type: 'text', at: { x: x + 5.8, y: y + 0.35 }, text: 'assumed data', size: TEXT.table, align: 'start' },
  );
  return { type: 'drawn', height: Math.ceil((SAMPLES.length + 1) / across) * 2.1, primitives, strokes };
}
