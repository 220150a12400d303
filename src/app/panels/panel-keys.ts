import type { PanelId } from '../state/view.svelte.ts';

/** Keys that open and close panels, from anywhere but a field. */
export const PANEL_KEYS: Readonly<Record<string, PanelId>> = {
  l: 'legend',
  w: 'why',
  f: 'findings',
  e: 'settings',
  o: 'conditions',
  u: 'rules',
  b: 'bleed',
  v: 'influence',
  m: 'moves',
  y: 'loss',
  '?': 'keys',
};
