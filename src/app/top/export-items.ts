import type { MenuItem } from '../ui/menu-item.ts';
import { exportDrawing, exportTable } from '../files/export.ts';
import { session } from '../state/session.svelte.ts';

export function exportItems(): MenuItem[] {
  const none = session.table === undefined;
  return [
    { heading: 'Drawing, as it stands in this row' },
    { text: 'SVG', hint: 'In the colours of the light theme', run: () => exportDrawing('light') },
    { text: 'SVG, dark', run: () => exportDrawing('dark') },
    { heading: 'State table, all rows' },
    { text: 'CSV', hint: 'For spreadsheets', disabled: none, run: () => void exportTable('csv') },
    { text: 'JSON', disabled: none, run: () => void exportTable('json') },
    { text: 'Markdown', disabled: none, run: () => void exportTable('md') },
  ];
}
