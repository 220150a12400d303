import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { KEY_GROUPS } from '../../../src/app/panels/key-groups.ts';
import { PANEL_KEYS } from '../../../src/app/panels/panel-keys.ts';
import { SHEET_COMMANDS } from '../../../src/app/sheet/commands.ts';
import { sayChord } from '../../../src/app/sheet/chords.ts';

const text = (path: string): string => readFileSync(new URL(`../../../${path}`, import.meta.url), 'utf8');

/** Every key and every word of keys in the list. */
const listed = new Set(
  KEY_GROUPS.flatMap(({ lines }) =>
    lines.flatMap(({ keys }) => {
      const single = keys.split(' ');
      const isRow = single.length > 1 && single.every((key) => [...key].length === 1);
      return [keys, ...keys.split(' or '), ...(isRow ? single : [])];
    }),
  ),
);

test('the list of keys has every key of the sheet, with what it does', () => {
  for (const { id, title, keys } of SHEET_COMMANDS) {
    if (id.startsWith('arrow-') || id === 'undo' || id === 'redo') continue;
    const line = KEY_GROUPS.flatMap(({ lines }) => lines).find(({ does }) => does === title);
    expect(line?.keys, title).toBe(keys.map(sayChord).join(' or '));
  }
});

test('the list of keys has every key that works everywhere', () => {
  const source = text('src/app/keys.ts');
  const plain = source.slice(source.indexOf('function plain'));
  const control = source.slice(source.indexOf('function command'), source.indexOf('function plain'));
  const keysIn = (part: string): string[] =>
    [...part.matchAll(/key === '(.)'/g)].map(([, key]) => (key ?? '').toUpperCase());
  const wanted = [
    ...Object.keys(PANEL_KEYS).map((key) => key.toUpperCase()),
    ...keysIn(plain),
    ...keysIn(control).map((key) => `Ctrl ${key}`),
  ];
  expect(wanted.length).toBeGreaterThan(20);
  // `E` with Shift is the valve maker.
  expect(wanted.filter((key) => !listed.has(key))).toEqual([]);
});

test('every key that the readme speaks of is in the list', () => {
  const readme = text('README.md');
  const screen = readme.slice(readme.indexOf('## On the screen'), readme.indexOf('## Command line'));
  const keys = [...screen.matchAll(/`((?:(?:Ctrl|Shift) )*[A-Z?/;,.[\]])`/g)].map(([, key]) => key ?? '');
  expect(keys.length).toBeGreaterThan(15);
  expect(keys.filter((key) => !listed.has(key))).toEqual([]);
});
