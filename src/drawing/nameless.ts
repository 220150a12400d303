import type { PartKind } from '../parts/contract.ts';

/** Stands for a kind that the catalogue does not know: no ports, nothing drawn. */
export const nameless = (kind: string): PartKind => ({
  kind,
  title: kind,
  group: 'Measure and joints',
  help: '',
  words: [],
  prefix: '?',
  settings: [],
  readyMade: [],
  ports: () => [],
  elements: () => [],
  draw: () => [],
  bounds: () => ({ x: 0, y: 0, width: 0, height: 0 }),
});
