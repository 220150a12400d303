import { add, emptySet, isEmpty } from '../base/bits.ts';
import type { BitSet } from '../base/bits.ts';
import type { NetRating } from '../network/network.ts';
import { sayRows, witnesses } from './evidence.ts';
import type { Evidence, Finding } from './finding.ts';
import { pressuresOf } from './pressures.ts';

/** Pa over a rating that still counts as none. */
const SLACK = 1e5;
const bar = (pressure: number): string => `${Math.round(pressure / 1e5)} bar`;

interface Beyond {
  readonly rating: NetRating;
  readonly highest: number;
  readonly rows: BitSet;
  /** Rows whose pressures were looked at. */
  readonly looked: number;
}

/** Ratings that the pressure of their line passes, one for each part: the one passed by most. */
export function beyond(
  evidence: Evidence,
  chosen: (rating: NetRating, pressure: number, source: number) => boolean,
): Beyond[] {
  const { net, table } = evidence;
  if (net.ratings.length === 0) return [];
  const { rows, of, looked, source } = pressuresOf(evidence);
  const byPart = new Map<number, Beyond>();
  for (const rating of net.ratings) {
    const found = emptySet(table.count);
    let highest = 0;
    rows.forEach((row, i) => {
      const pressure = of[i]?.[rating.line] ?? 0;
      if (pressure <= rating.pressure + SLACK || !chosen(rating, pressure, source)) return;
      add(found, row);
      highest = Math.max(highest, pressure);
    });
    const before = byPart.get(rating.part);
    if (!isEmpty(found) && (before === undefined || highest > before.highest))
      byPart.set(rating.part, { rating, highest, rows: found, looked });
  }
  return [...byPart.values()];
}

export const ratingFinding = (
  { net, table }: Evidence,
  { rating, highest, rows, looked }: Beyond,
  words: { rule: string; title: (label: string) => string; why: string; remedy: string },
): Finding => {
  const part = net.parts[rating.part];
  const seen = witnesses(rows);
  const sample =
    looked < table.count
      ? `; ${looked} of ${table.count.toLocaleString('en')} rows were looked at, others may stand higher`
      : '';
  const stands = `${part?.label ?? ''}.${rating.port} stands at ${bar(highest)} (${sayRows(seen)}${sample}), and is built for ${bar(rating.pressure)}`;
  return {
    rule: words.rule,
    level: rating.assumed ? 'caution' : 'danger',
    title: words.title(part?.label ?? ''),
    what: `${stands}${rating.assumed ? ' (assumed: nobody entered its rating)' : ''}. ${words.why}`,
    remedy: words.remedy,
    parts: part ? [part.id] : [],
    lines: rating.line < net.shown ? [rating.line] : [],
    ...seen,
  };
};

/** What no pump can give stands higher than it: the ratio of areas, a load, or a divider makes it. */
export const isIntensified = (pressure: number, source: number): boolean => pressure > source + SLACK;
