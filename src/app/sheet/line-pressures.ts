import { lineAssumed, pressureKnown } from '../state/assumed.ts';
import type { Assumed } from '../state/assumed.ts';
import { NEAR_NOTHING, sayPressure } from '../state/figure-texts.ts';
import { figures } from '../state/figures.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { view } from '../state/view.svelte.ts';

export interface LinePressure {
  /** Index in the table. */
  readonly line: number;
  readonly text: string;
  readonly assumed: boolean;
}

/** Pressures of the moment on show, or of the current row, that can be worked out and are worth saying. */
export function linePressures(assumed: Assumed): LinePressure[] {
  const { table, row, moment } = session;
  if (table && moment) {
    return table.data.lines.flatMap(({ name }, line) => {
      const pressure = moment.pressures.get(name) ?? 0;
      if (!(pressure >= NEAR_NOTHING)) return [];
      return [{ line, text: sayPressure(pressure, view.units), assumed: lineAssumed(assumed, table, line, row) }];
    });
  }
  const numbers = figures.current;
  if (!table || numbers?.status !== 'solved') return [];
  return table.data.lines.flatMap((_, line) => {
    const pressure = numbers.lines[line] ?? 0;
    if (!(pressure >= NEAR_NOTHING)) return [];
    if (!pressureKnown(table, line, row)) return [];
    return [{ line, text: sayPressure(pressure, view.units), assumed: lineAssumed(assumed, table, line, row) }];
  });
}
