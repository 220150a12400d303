import type { Page } from 'playwright-core';
import type { Point } from '../../src/base/points.ts';
import type { Circuit, Part } from '../../src/circuit/model.ts';
import { circuitBounds } from '../../src/drawing/geometry.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { placedPorts } from '../../src/drawing/shapes.ts';
import type { Drawn } from './drawn.ts';

/** One small thing that a hand does; a list of them says all that was done, and does it again. */
export type Act =
  | readonly ['key', string]
  /** Into the field that has the keyboard. */
  | readonly ['type', string]
  | readonly ['click', number, number]
  | readonly ['drag', number, number, number, number]
  /** To that field of the settings panel, if it is there. */
  | readonly ['field', string]
  | readonly ['reload'];

/** Numbers from a seed, the same everywhere (mulberry32). */
export function numbers(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** What may be done to a circuit that is shown whole; the acts of one step are one change, or a few. */
export function nextStep(circuit: Circuit, random: () => number): readonly Act[] {
  const pick = <T>(list: readonly T[]): T | undefined => list[Math.floor(random() * list.length)];
  const within = (low: number, high: number): number => Math.round(low + random() * (high - low));
  const placed = placeMissing(circuit);
  const part = pick(placed.parts);
  // On the paper in sight once the whole circuit is shown.
  const { x, y, width, height } = circuitBounds(placed);
  const spot = (): Point => ({
    x: within(Math.min(x, x + width / 2 - 30), Math.max(x + width, x + width / 2 + 30)),
    y: within(Math.min(y, y + height / 2 - 16), Math.max(y + height, y + height / 2 + 16)),
  });
  const to = spot();
  const on = (one: Part | undefined): readonly Act[] => (one?.at ? [['click', one.at.x, one.at.y]] : []);
  const ports = placed.parts.flatMap((each) => placedPorts(each));
  const stretch = (): readonly [Point, Point] | undefined => {
    const points = routeAll(placed).get(pick(circuit.connections)?.id ?? '') ?? [];
    const i = within(0, Math.max(0, points.length - 2));
    const [a, b] = [points[i], points[i + 1]];
    return a && b ? [a, b] : undefined;
  };
  const between = ([a, b]: readonly [Point, Point]): readonly [number, number] => [(a.x + b.x) / 2, (a.y + b.y) / 2];
  const line = (): readonly Act[] => {
    const found = stretch();
    return found ? [['click', ...between(found)]] : [];
  };
  const search = (words: string): readonly Act[] => [
    ['type', words],
    ['key', 'Enter'],
  ];
  const name = `N${within(1, 99)}`;
  const form = pick(FORMS) ?? '';

  const STEPS: readonly (readonly [weight: number, () => readonly Act[]])[] = [
    [circuit.parts.length < 6 ? 30 : 3, () => [['key', 'a'], ...search(form), ['click', to.x, to.y]]],
    [
      1,
      () => [
        ['key', 'a'],
        ...search(form),
        ['key', 't'],
        ['key', String(Math.abs(to.x) % 10)],
        ['type', ` ${to.y}`],
        ['key', 'Enter'],
      ],
    ],
    [
      1,
      () => [
        ['key', 'a'],
        ...search(pick(['power unit', 'locked section', 'bank section']) ?? ''),
        ['click', to.x, to.y],
      ],
    ],
    [3, () => (part?.at ? [['drag', part.at.x, part.at.y, to.x, to.y]] : [])],
    [2, () => [...on(part), ['key', 'ArrowRight'], ['key', 'Shift+ArrowUp'], ['key', 'ArrowRight']]],
    [
      6,
      () => {
        const [a, b] = [pick(ports), pick(ports)];
        return a && b ? [['drag', a.at.x, a.at.y, b.at.x, b.at.y]] : [];
      },
    ],
    [
      2,
      () => {
        const [a, b] = [pick(ports), stretch()];
        return a && b ? [['drag', a.at.x, a.at.y, ...between(b)]] : [];
      },
    ],
    [2, () => [...on(part), ['key', 'Delete']]],
    [1, () => [...on(part), ['key', 'Shift+Delete']]],
    [1, () => [...line(), ['key', 'Delete']]],
    [2, () => [...on(part), ['key', pick(['t', 'Shift+T', 'f']) ?? 't']]],
    [1, () => [...on(part), ['key', 'Control+d']]],
    [1, () => [...on(part), ['key', 'k'], ['key', 'Control+c'], ['key', 'Control+v'], ['key', 'Control+v']]],
    [1, () => [...on(part), ['key', 'Control+x'], ['key', 'Control+v']]],
    [
      2,
      () => [
        ...on(part),
        ['key', 'k'],
        ['key', pick(['v', 'h', 'Shift+H', 'Shift+V', 'Control+Shift+ArrowLeft']) ?? 'v'],
      ],
    ],
    [1, () => [...on(part), ['key', 'F2'], ...search(name)]],
    [1, () => [...line(), ['key', 'F2'], ...search(name)]],
    [1, () => [...line(), ['key', pick(['d', 'Shift+M']) ?? 'd']]],
    [1, () => [...line(), ['key', 'n'], ...search('12x1.5')]],
    [1, () => [...on(part), ['key', 's'], ...search(form)]],
    [1, () => [...on(part), ['key', 'k'], ['key', 'g'], ...search(name)]],
    [1, () => [...on(part), ['key', 'Shift+G']]],
    [1, () => [['key', 'x'], ['click', to.x, to.y], ...search(`text ${name}`)]],
    [
      2,
      () => {
        const found = stretch();
        if (!found) return [];
        const [sx, sy] = between(found);
        return [['drag', sx, sy, sx + within(-4, 4), sy + within(-4, 4)]];
      },
    ],
    [
      2,
      () => [
        ...on(part),
        ['key', 'e'],
        ['field', pick(['Flow', 'Setting', 'Bore', 'Stroke', 'Load']) ?? ''],
        ...search(String(within(20, 90))),
      ],
    ],
    [
      1,
      () => [
        ...line(),
        ['key', 'i'],
        ...search(pick(['filter', 'check valve', 'shut-off valve']) ?? ''),
        ['key', 'Enter'],
      ],
    ],
    [1, () => [...on(part), ['key', 'Shift+A']]],
    [
      1,
      () => [
        ['key', 'Control+a'],
        ['key', 'ArrowDown'],
      ],
    ],
    [
      2,
      () => [
        ['key', 'Control+z'],
        ['key', 'Control+z'],
      ],
    ],
    [
      1,
      () => [
        ['key', 'Control+z'],
        ['key', 'Control+Shift+z'],
      ],
    ],
    [1, () => [...on(part), ['key', '@'], ...search(`${to.x}, ${to.y}`)]],
  ];
  const sum = STEPS.reduce((all, [weight]) => all + weight, 0);
  let left = random() * sum;
  const [, make] = STEPS.find(([weight]) => (left -= weight) < 0) ?? STEPS[0] ?? [];
  return make?.() ?? [];
}

const FORMS = [
  'fixed pump',
  'tank',
  'relief valve',
  'cylinder',
  'motor',
  '4/3 lever',
  '4/2 coil',
  'throttle',
  'check valve',
  'double lock check',
  'counterbalance',
  'accumulator',
  'gauge',
  'tee',
  'filter',
];

export async function act({ page, host, at }: Drawn, [what, ...how]: Act): Promise<void> {
  const move = async (x: number, y: number, steps = 1): Promise<void> => {
    const [px, py] = await at(x, y);
    await page.mouse.move(px, py, { steps });
  };
  if (what === 'key') await page.keyboard.press(String(how[0]));
  else if (what === 'type') await page.keyboard.insertText(String(how[0]));
  else if (what === 'field') await focusField(page, String(how[0]));
  else if (what === 'reload') {
    await page.reload();
    await host.locator('svg').first().waitFor();
  } else {
    const [x0 = 0, y0 = 0, x1 = x0, y1 = y0] = how.map(Number);
    await move(x0, y0);
    await page.mouse.down();
    if (what === 'drag') {
      await move((x0 + x1) / 2, (y0 + y1) / 2);
      await move(x1, y1);
    }
    await page.mouse.up();
  }
}

async function focusField(page: Page, label: string): Promise<void> {
  await page.evaluate((wanted) => {
    const labels = [...document.querySelectorAll<HTMLLabelElement>('[role=dialog][aria-label^="Settings of"] label')];
    const control = labels.find((each) => each.textContent === wanted)?.control;
    if (control instanceof HTMLInputElement) control.select();
    control?.focus();
  }, label);
}
