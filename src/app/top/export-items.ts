import type { MenuItem } from '../ui/menu-item.ts';
import { exportTable } from '../files/export.ts';
import { printing } from '../print/choice.svelte.ts';
import { saveDrawingPng, saveDrawingSvg, savePartList } from '../print/save-pages.ts';
import { session } from '../state/session.svelte.ts';
import { view } from '../state/view.svelte.ts';

export function exportItems(): MenuItem[] {
  const none = session.table === undefined;
  const { dpi } = printing.choices;
  return [
    { text: 'Drawing and print…', keys: 'Ctrl P', hint: 'In its frame, with the chart', run: () => view.open('print') },
    { heading: 'Drawing, as it stands in this row' },
    { text: 'SVG', hint: 'In the colours of the light theme', run: () => void saveDrawingSvg('row', 'light') },
    { text: 'SVG, dark', run: () => void saveDrawingSvg('row', 'dark') },
    { text: 'PNG', hint: `${dpi} dpi`, run: () => void saveDrawingPng('row', 'light', dpi) },
    { heading: 'Drawing, without the state' },
    { text: 'SVG, plain', run: () => void saveDrawingSvg('plain', 'light') },
    { text: 'PNG, plain', hint: `${dpi} dpi`, run: () => void saveDrawingPng('plain', 'light', dpi) },
    { heading: 'State table, all rows' },
    { text: 'CSV', hint: 'For spreadsheets', disabled: none, run: () => void exportTable('csv') },
    { text: 'JSON', disabled: none, run: () => void exportTable('json') },
    { text: 'Markdown', disabled: none, run: () => void exportTable('md') },
    { heading: 'Parts' },
    { text: 'Part list, CSV', run: savePartList },
  ];
}
