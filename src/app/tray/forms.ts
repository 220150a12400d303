import type { Part } from '../../circuit/model.ts';
import type { PartGroup, PartKind, ReadyMade } from '../../parts/contract.ts';

/** One thing in the tray. */
export interface TrayForm {
  readonly kind: PartKind;
  readonly ready: ReadyMade;
  /** A part as it would be placed, for its picture. */
  readonly sample: Part;
}

export const formOf = (kind: PartKind, ready: ReadyMade): TrayForm => ({
  kind,
  ready,
  sample: { id: 'sample', kind: kind.kind, ...ready.make() },
});

export const formsOf = (kinds: readonly PartKind[]): TrayForm[] =>
  kinds.flatMap((kind) => kind.readyMade.map((ready) => formOf(kind, ready)));

/** What the narrow strip shows of a group: its heading, short enough for 52 px, and how many pictures. */
export const STRIP: readonly { readonly group: PartGroup; readonly short: string; readonly kinds: readonly string[] }[] = [
  { group: 'Supply', short: 'Supply', kinds: ['fixed-pump', 'tank'] },
  { group: 'Motion', short: 'Motion', kinds: ['cylinder', 'motor'] },
  { group: 'Direction', short: 'Direction', kinds: ['directional-valve', 'shut-off-valve'] },
  { group: 'Pressure', short: 'Pressure', kinds: ['relief-valve'] },
  { group: 'Flow and check', short: 'Flow', kinds: ['throttle', 'check-valve'] },
  { group: 'Store', short: 'Store', kinds: ['accumulator'] },
  { group: 'Measure and joints', short: 'Measure', kinds: ['gauge'] },
];
