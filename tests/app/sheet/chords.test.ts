import { expect, test } from 'vitest';
import { matches, sayChord } from '../../../src/app/sheet/chords.ts';
import { commandFor, SHEET_COMMANDS } from '../../../src/app/sheet/commands.ts';

const press = (key: string, mods: Partial<Record<'ctrlKey' | 'metaKey' | 'shiftKey' | 'altKey', boolean>> = {}) => ({
  key, ctrlKey: false, metaKey: false, shiftKey: false, altKey: false, ...mods,
});

test.each([
  ['T', press('t'), true],
  ['T', press('T', { shiftKey: true }), false],
  ['Shift+T', press('T', { shiftKey: true }), true],
  ['Ctrl+Z', press('z', { ctrlKey: true }), true],
  ['Ctrl+Z', press('z', { metaKey: true }), true],
  ['Ctrl+Z', press('z'), false],
  ['Ctrl+Z', press('Z', { ctrlKey: true, shiftKey: true }), false],
  ['+', press('+', { shiftKey: true }), true],
  ['+', press('+'), true],
  ['-', press('_', { shiftKey: true }), false],
  ['Shift+Delete', press('Delete'), false],
  ['T', press('t', { altKey: true }), false],
])('%s and %o: %s', (chord, event, wanted) => {
  expect(matches(chord, event)).toBe(wanted);
});

test('no key means two things, and every command has a key', () => {
  const keys = SHEET_COMMANDS.flatMap((command) => command.keys);
  expect(new Set(keys).size).toBe(keys.length);
  expect(SHEET_COMMANDS.filter((command) => command.keys.length === 0)).toEqual([]);
  expect(new Set(SHEET_COMMANDS.map((command) => command.id)).size).toBe(SHEET_COMMANDS.length);
});

test('keys find their command', () => {
  expect(commandFor(press('z', { ctrlKey: true }))?.id).toBe('undo');
  expect(commandFor(press('Z', { ctrlKey: true, shiftKey: true }))?.id).toBe('redo');
  expect(commandFor(press('Tab', { shiftKey: true }))?.id).toBe('previous');
  expect(commandFor(press('q'))).toBeUndefined();
});

test('arrows are shown as arrows', () => {
  expect(sayChord('Shift+ArrowLeft')).toBe('Shift ←');
});
