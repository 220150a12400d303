import type { Edge, Way } from '../../drawing/arrange.ts';
import type { Chord } from './chords.ts';

/** What the commands act on; the sheet's desk implements it. */
export interface SheetActions extends ArrangeActions, LineActions, LookActions, SheetsActions {
  cancel(): void;
  accept(): void;
  /** Go to the next or previous thing in reading order; false at the end, so that Tab leaves the sheet. */
  step(by: 1 | -1): boolean;
  /** Along the line that the keyboard is at: from a port to it, and on to its other end. */
  follow(): void;
  /** Nudge what is selected, move what is being placed, go to the next port, or pan. */
  arrow(dx: number, dy: number): void;
  turn(by: 90 | -90): void;
  /** False if nothing is there to flip. */
  flip(): boolean;
  remove(heal: boolean): void;
  duplicate(): void;
  selectAll(): void;
  rename(): void;
  /** Type where what is selected, or in hand, is to stand. */
  typeSpot(): void;
  connectFrom(): void;
  openSettings(): void;
  shiftLever(by: 1 | -1): void;
  undo(): void;
  redo(): void;
  zoom(factor: number): void;
  fit(): void;
  openTray(): void;
}

export interface ArrangeActions {
  /** False if no part is selected. */
  align(edge: Edge): boolean;
  distribute(way: Way): void;
  /** All parts of the kinds that are selected; likewise lines of one use, and texts. */
  selectKind(): void;
  /** Open the tray; what is picked goes into the selected line, or takes the place of the selected part. */
  insertPart(): void;
  swap(): void;
  group(): void;
  ungroup(): void;
  addSection(): void;
  saveOwn(): void;
  writeText(): void;
}

export interface LineActions {
  /** Go along the stretches of the selected line with Tab and move them with the arrows. */
  bend(): void;
  tidy(): void;
  nextUse(): void;
  setSize(): void;
}

export interface LookActions {
  openMenu(): void;
  find(): void;
  toggleOverview(): void;
  toggleRulers(): void;
  toggleGrid(): void;
  toggleHops(): void;
  /** On the selected valve, or on a new ready-made one. */
  openMaker(): void;
}

export interface SheetsActions {
  /** False if there is but one sheet. */
  turnSheet(by: 1 | -1): boolean;
  /** Go to a sheet; add, name, move or delete one. */
  sheetMenu(): void;
  /** Asks which sheet what is selected is to go to. */
  moveToSheet(): void;
  /** To where the line of a reference goes on. */
  followReference(id: string): void;
}

export type CommandGroup = 'Draw' | 'Change' | 'Arrange' | 'Lines' | 'Select and go' | 'Sheets' | 'Levers' | 'View';

export interface Command {
  readonly id: string;
  readonly title: string;
  readonly group: CommandGroup;
  readonly keys: readonly Chord[];
  /** Absent: the browser's own clipboard events do it. Gives false to let the key pass on. */
  readonly run?: (sheet: SheetActions) => unknown;
}
