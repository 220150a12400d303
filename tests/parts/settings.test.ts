import { expect, test } from 'vitest';
import type { Part, Setting } from '../../src/circuit/model.ts';
import { CATALOGUE } from '../../src/parts/catalogue.ts';
import {
  checkSettings,
  choiceSetting,
  numberSetting,
  quantitySetting,
  readChoice,
  readSetting,
  readSwitch,
  switchSetting,
} from '../../src/parts/settings.ts';

const words = (id: string): { id: string; title: string; help: string } => ({ id, title: 'Flow', help: '' });
const FLOW = quantitySetting(words('flow'), 'flow', '30 L/min', { min: '1 L/min', max: '100 L/min' });
const RATIO = numberSetting(words('ratio'), 3, { min: 1, max: 10 });
const WAY = choiceSetting(words('way'), ['spring', 'load'], 'spring');
const TIGHT = switchSetting(words('tight'), false);
const SPECS = [FLOW, RATIO, WAY, TIGHT];
const part = (settings: Readonly<Record<string, Setting>>): Part => ({ id: 'X', kind: 'fixed-pump', settings });

test('what is typed is read in SI and kept as typed', () => {
  expect(readSetting(part({ flow: '60 L/min' }), FLOW)).toEqual({ si: 1e-3, typed: '60 L/min', assumed: false });
  expect(readSetting(part({ ratio: 4 }), RATIO)).toEqual({ si: 4, typed: 4, assumed: false });
  expect(readSetting(part({ ratio: '4:1' }), RATIO)).toEqual({ si: 4, typed: '4:1', assumed: false });
});

test('what is not typed is assumed', () => {
  expect(readSetting(part({}), FLOW)).toEqual({ si: 0.03 / 60, assumed: true });
  expect(readSetting({ id: 'X', kind: 'fixed-pump' }, RATIO)).toEqual({ si: 3, assumed: true });
  expect(readChoice(part({}), WAY)).toBe('spring');
  expect(readSwitch(part({}), TIGHT)).toBe(false);
});

test.each<[string, Setting, RegExp]>([
  ['flow', 'fast', /number/],
  ['flow', '30 mm', /is a length/],
  ['flow', '30', /no unit/],
  ['flow', 30, /without a unit/],
  ['flow', '-5 L/min', /below 1 L\/min/],
  ['flow', '0 L/min', /below/],
  ['flow', '500 L/min', /above 100 L\/min/],
  ['flow', '1,5 L/min', /comma/],
  ['ratio', Number.NaN, /not a number/],
  ['ratio', Number.POSITIVE_INFINITY, /not a number/],
  ['ratio', 0.5, /below 1/],
  ['ratio', 'many', /not a number/],
  ['ratio', true, /not a number/],
  ['way', 'rope', /cannot be "rope"/],
  ['way', 3, /cannot be 3/],
  ['tight', 'yes', /is "yes"/],
])('%s = %s is an error, and the default stands in', (id, typed, what) => {
  const bad = part({ [id]: typed });
  const found = checkSettings(bad, SPECS);
  expect(found).toHaveLength(1);
  expect(found[0]).toMatchObject({ where: `settings.${id}`, what: expect.stringMatching(what) as string });
  expect(found[0]?.level ?? 'error').toBe('error');
  expect(found[0]?.remedy).not.toBe('');
  expect(readSetting(bad, FLOW).si).toBe(0.03 / 60);
  expect(readSetting(bad, RATIO).si).toBe(3);
  expect(readChoice(bad, WAY)).toBe('spring');
  expect(readSwitch(bad, TIGHT)).toBe(false);
});

test('an unknown setting is a warning that names the known ones', () => {
  expect(checkSettings(part({ flwo: '3 L/min' }), SPECS)).toEqual([
    {
      level: 'warning',
      where: 'settings.flwo',
      what: expect.stringContaining('"flwo"') as string,
      remedy: expect.stringContaining('flow, ratio') as string,
    },
  ]);
});

test('every default of every kind passes its own check', () => {
  for (const kind of CATALOGUE) {
    const defaults = Object.fromEntries(kind.settings.map((spec) => [spec.id, spec.value.default]));
    expect(checkSettings({ id: 'X', kind: kind.kind, settings: defaults }, kind.settings), kind.kind).toEqual([]);
    for (const spec of kind.settings)
      expect(
        [spec.title, spec.help].every((text) => text.length > 2),
        `${kind.kind}.${spec.id}`,
      ).toBe(true);
    expect(new Set(kind.settings.map((spec) => spec.id)).size).toBe(kind.settings.length);
  }
});
