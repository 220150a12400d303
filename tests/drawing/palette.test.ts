import { expect, test } from 'vitest';
import { cssVariables, LINE_TOKENS, PALETTE, TEXT_TOKENS } from '../../src/drawing/palette.ts';
import type { ColourToken, Theme } from '../../src/drawing/palette.ts';

const THEMES: readonly Theme[] = ['light', 'dark'];

/** Relative luminance, WCAG 2.2, definition of "relative luminance". */
function luminance(hex: string): number {
  const channel = (at: number): number => {
    const v = Number.parseInt(hex.slice(at, at + 2), 16) / 255;
    return v <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4;
  };
  return 0.2126 * channel(1) + 0.7152 * channel(3) + 0.0722 * channel(5);
}

/** Contrast ratio, WCAG 2.2, definition of "contrast ratio". */
function contrast(a: string, b: string): number {
  const [high, low] = [luminance(a), luminance(b)].sort((x, y) => y - x) as [number, number];
  return (high + 0.05) / (low + 0.05);
}

test('the formula gives 21:1 for black on white, and about 4.48:1 for #777777 on white (WCAG 2.2 understanding 1.4.3)', () => {
  expect(contrast('#000000', '#FFFFFF')).toBeCloseTo(21, 5);
  expect(contrast('#777777', '#FFFFFF')).toBeCloseTo(4.48, 2);
});

const pairs = (inks: readonly ColourToken[], papers: readonly ColourToken[]): [Theme, ColourToken, ColourToken][] =>
  THEMES.flatMap((theme) =>
    inks.flatMap((ink) => papers.map((paper): [Theme, ColourToken, ColourToken] => [theme, ink, paper])),
  );

test.each(pairs(TEXT_TOKENS, ['paper', 'chrome', 'panel', 'current-row', 'folded-band']))(
  '%s: %s text on %s has at least 4.5:1 (WCAG 2.2, 1.4.3)',
  (theme, ink, paper) => {
    expect(contrast(PALETTE[theme][ink], PALETTE[theme][paper])).toBeGreaterThanOrEqual(4.5);
  },
);

test.each(pairs([...LINE_TOKENS, 'idle', 'rule'], ['paper']))(
  '%s: %s strokes on %s have at least 3:1 (WCAG 2.2, 1.4.11)',
  (theme, ink, paper) => {
    expect(contrast(PALETTE[theme][ink], PALETTE[theme][paper])).toBeGreaterThanOrEqual(3);
  },
);

test('every token becomes a variable, in both themes alike', () => {
  for (const theme of THEMES) {
    const names = [...cssVariables(theme).matchAll(/--([a-z-]+): (#[0-9A-F]{6});/g)].map((m) => [m[1], m[2]]);
    expect(Object.fromEntries(names)).toEqual(PALETTE[theme]);
  }
  expect(Object.keys(PALETTE.light)).toEqual(Object.keys(PALETTE.dark));
});
