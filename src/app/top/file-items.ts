import { EXAMPLES } from '../files/examples.ts';
import { newCircuit, openFromDisk, openText } from '../files/open.ts';
import { recent } from '../files/recent.svelte.ts';
import { save, saveAs } from '../files/save.ts';
import { loadReadyMade, saveReadyMade } from '../files/ready-made.ts';
import type { MenuItem } from '../ui/menu-item.ts';

export const fileItems = (): MenuItem[] => [
  { text: 'New', hint: 'An empty sheet', run: newCircuit },
  { text: 'Open…', keys: 'Ctrl O', run: () => void openFromDisk() },
  { text: 'Save', keys: 'Ctrl S', run: () => void save() },
  { text: 'Save as…', keys: 'Ctrl Shift S', run: () => void saveAs() },
  { heading: 'Your own ready-made circuits' },
  { text: 'Save them to a file…', run: () => void saveReadyMade() },
  {
    text: 'Load them from a file…',
    hint: 'Or one circuit file, as a ready-made circuit',
    run: () => void loadReadyMade(),
  },
];

export const labelledExamples = (): MenuItem[] =>
  EXAMPLES.length === 0
    ? []
    : [
        { heading: 'Examples' },
        ...EXAMPLES.map(({ title, text }): MenuItem => ({
          text: title,
          run: () => void openText(text, { name: undefined }),
        })),
      ];

export const recentItems = (): MenuItem[] =>
  recent.list.length === 0
    ? []
    : [
        { heading: 'Recent files' },
        ...recent.list.map((file): MenuItem => ({
          text: file.name,
          hint: file.handle ? file.circuit : `${file.circuit}; this browser asks for the file again`,
          run: () => void recent.open(file),
        })),
        { text: 'Forget these names', run: () => recent.clear() },
      ];
