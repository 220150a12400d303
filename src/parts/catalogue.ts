import { accumulator } from './accumulator.ts';
import { checkValve } from './check-valve.ts';
import { compensatedPump } from './compensated-pump.ts';
import type { PartKind, ReadyMade } from './contract.ts';
import { counterbalanceValve } from './counterbalance-valve.ts';
import { cylinder } from './cylinder.ts';
import { directionalValve } from './directional-valve.ts';
import { doubleLockCheck } from './double-lock-check.ts';
import { doubleRodCylinder } from './double-rod-cylinder.ts';
import { filter } from './filter.ts';
import { fixedPump } from './fixed-pump.ts';
import { flowControl } from './flow-control.ts';
import { flowDivider } from './flow-divider.ts';
import { gauge } from './gauge.ts';
import { handPump } from './hand-pump.ts';
import { junction } from './junction.ts';
import { lockCheck } from './lock-check.ts';
import { motor } from './motor.ts';
import { oneWayThrottle } from './one-way-throttle.ts';
import { pilotReliefValve } from './pilot-relief-valve.ts';
import { pilotValve } from './pilot-valve.ts';
import { plug } from './plug.ts';
import { pressureSwitch } from './pressure-switch.ts';
import { quickCoupling } from './quick-coupling.ts';
import { reducingValve } from './reducing-valve.ts';
import { reliefValve } from './relief-valve.ts';
import { rollerValve } from './roller-valve.ts';
import { sequenceValve } from './sequence-valve.ts';
import { shutOffValve } from './shut-off-valve.ts';
import { shuttleValve } from './shuttle-valve.ts';
import { singleActingCylinder } from './single-acting-cylinder.ts';
import { tank } from './tank.ts';
import { throttle } from './throttle.ts';
import { twoStageValve } from './two-stage-valve.ts';
import { unloadingValve } from './unloading-valve.ts';

/** All part kinds, in the order of the tray. */
export const CATALOGUE: readonly PartKind[] = [
  fixedPump,
  compensatedPump,
  handPump,
  tank,
  filter,
  cylinder,
  doubleRodCylinder,
  singleActingCylinder,
  motor,
  directionalValve,
  pilotValve,
  twoStageValve,
  rollerValve,
  shutOffValve,
  reliefValve,
  pilotReliefValve,
  sequenceValve,
  unloadingValve,
  counterbalanceValve,
  reducingValve,
  checkValve,
  lockCheck,
  doubleLockCheck,
  throttle,
  oneWayThrottle,
  flowControl,
  flowDivider,
  shuttleValve,
  accumulator,
  gauge,
  pressureSwitch,
  quickCoupling,
  plug,
  junction,
];

const BY_KIND: ReadonlyMap<string, PartKind> = new Map(CATALOGUE.map((kind) => [kind.kind, kind]));

export const kindOf = (kind: string): PartKind | undefined => BY_KIND.get(kind);

export interface CatalogueEntry {
  readonly kind: PartKind;
  readonly readyMade: ReadyMade;
}

export const ENTRIES: readonly CatalogueEntry[] = CATALOGUE.flatMap((kind) =>
  kind.readyMade.map((readyMade) => ({ kind, readyMade })),
);

export const readyMadeOf = (id: string): CatalogueEntry | undefined =>
  ENTRIES.find((entry) => entry.readyMade.id === id);

/** Lower case, dashes of all kinds and punctuation as blanks, accents dropped. */
const plain = (text: string): string =>
  text
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^\p{L}\p{N}/]+/gu, ' ')
    .trim();

/**
 * Ready-made parts whose title or trade words hold every word looked for, best first: whole words
 * of the title, then beginnings, then the rest; equal ones in the order of the tray, a title that says no
 * more than what was looked for before them. An empty search gives all.
 */
export function searchCatalogue(
  query: string,
  entries: readonly CatalogueEntry[] = ENTRIES,
): readonly CatalogueEntry[] {
  const wanted = plain(query)
    .split(' ')
    .filter((word) => word !== '');
  if (wanted.length === 0) return entries;
  const score = ({ kind, readyMade }: CatalogueEntry): number => {
    const title = plain(readyMade.title).split(' ');
    const others = plain(
      [kind.title, kind.kind, kind.group, ...kind.words, ...(readyMade.words ?? [])].join(' '),
    ).split(' ');
    let total = title.every((each) => wanted.includes(each)) ? 1 : 0;
    for (const word of wanted) {
      if (title.includes(word)) total += 4;
      else if (title.some((each) => each.startsWith(word))) total += 3;
      else if (others.includes(word)) total += 2;
      else if (others.some((each) => each.startsWith(word)) || title.some((each) => each.includes(word))) total += 1;
      else return 0;
    }
    return total;
  };
  return entries
    .map((entry) => ({ entry, score: score(entry) }))
    .filter((each) => each.score > 0)
    .sort((a, b) => b.score - a.score)
    .map((each) => each.entry);
}
