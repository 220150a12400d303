import type { UnitSystem } from '../../base/units.ts';
import { recall, remember } from './remembered.ts';

export type ThemeChoice = 'system' | 'light' | 'dark';
export type PanelId =
  | 'why'
  | 'legend'
  | 'findings'
  | 'settings'
  | 'keys'
  | 'conditions'
  | 'rules'
  | 'bleed'
  | 'influence'
  | 'moves'
  | 'loss'
  | 'print'
  | 'maker';
/** Numbers that the table shows in columns of their own. */
export type NumberGroup = 'lines' | 'forces' | 'flows' | 'power';
export type Page = 'sheet' | 'table' | 'plans';

/** How the person likes to see things; kept between visits, no part of the circuit. */
class View {
  theme = $state<ThemeChoice>(recall<ThemeChoice>('theme', 'system'));
  units = $state<UnitSystem>(recall<UnitSystem>('units', 'metric'));
  grid = $state(recall('grid', true));
  /** Speeds and pressures in the state table. */
  tableFigures = $state(recall('tableFigures', window.innerWidth >= 1200));
  /** Further numbers in columns of their own. */
  tableNumbers = $state.raw<readonly NumberGroup[]>(recall<readonly NumberGroup[]>('tableNumbers', []));
  /** Pressures at lines, speeds at actuators. */
  sheetFigures = $state(recall('sheetFigures', true));
  /** Whether the system asks for dark; `App` keeps it up to date. */
  systemDark = $state(false);
  /** Share of the height below the top bar that the sheet takes, 0 to 1. */
  sheetShare = $state(recall('sheetShare', 0.56));
  /** The same while step plans stand below, which need more room. */
  sheetSharePlans = $state(recall('sheetSharePlans', 0.4));
  /** Height of the bench in px; 0 = as tall as its slots need. */
  benchHeight = $state(recall('benchHeight', 0));
  /** Upper and lower edge of the sheet in the window, px: panels find their first place there. */
  sheetArea = $state.raw({ top: 40, bottom: 500 });
  /** Which page a small screen shows above the bench. */
  page = $state<Page>('sheet');
  /** What stands below the bench. */
  lower = $state<'table' | 'plans'>('table');
  panels = $state<Record<PanelId, boolean>>({
    why: false,
    legend: recall('legendOpen', window.innerWidth >= 900),
    findings: false,
    settings: false,
    keys: false,
    conditions: false,
    rules: false,
    bleed: false,
    influence: false,
    moves: false,
    loss: false,
    print: false,
    maker: false,
  });

  /** Panels from the lowest to the one on top. */
  stack = $state.raw<readonly PanelId[]>([]);

  /** The panel that the keyboard is on its way into. */
  entering = $state<PanelId | undefined>();

  dark = $derived(this.theme === 'dark' || (this.theme === 'system' && this.systemDark));

  setTheme(theme: ThemeChoice): void {
    this.theme = theme;
    remember('theme', theme);
  }

  setUnits(units: UnitSystem): void {
    this.units = units;
    remember('units', units);
  }

  setGrid(on: boolean): void {
    this.grid = on;
    remember('grid', on);
  }

  setTableFigures(on: boolean): void {
    this.tableFigures = on;
    remember('tableFigures', on);
  }

  showNumbers(group: NumberGroup, on: boolean): void {
    const others = this.tableNumbers.filter((each) => each !== group);
    this.tableNumbers = on ? [...others, group] : others;
    remember('tableNumbers', this.tableNumbers);
  }

  setSheetFigures(on: boolean): void {
    this.sheetFigures = on;
    remember('sheetFigures', on);
  }

  /** Undefined = as it is when nobody has dragged it. */
  setSheetShare(share: number | undefined): void {
    if (this.lower === 'plans') {
      this.sheetSharePlans = share ?? 0.4;
      remember('sheetSharePlans', this.sheetSharePlans);
    } else {
      this.sheetShare = share ?? 0.56;
      remember('sheetShare', this.sheetShare);
    }
  }

  /** More of the height for the sheet, or less; undefined = as it is when nobody has moved anything. */
  shareRoom(by: number | undefined): void {
    if (by === undefined) this.setBenchHeight(0);
    const share = this.lower === 'plans' ? this.sheetSharePlans : this.sheetShare;
    this.setSheetShare(by === undefined ? undefined : Math.min(0.9, Math.max(0.1, share + by)));
  }

  setBenchHeight(height: number): void {
    this.benchHeight = height;
    remember('benchHeight', height);
  }

  /** Below the bench, or as a page of its own on a small screen. */
  showLower(what: 'table' | 'plans'): void {
    this.lower = what;
    this.page = what;
  }

  open(panel: PanelId): void {
    this.panels[panel] = true;
    this.raise(panel);
    if (panel === 'legend') remember('legendOpen', true);
  }

  /** Open, and the keyboard goes into its first field. */
  enter(panel: PanelId): void {
    this.entering = panel;
    this.open(panel);
  }

  raise(panel: PanelId): void {
    if (this.stack.at(-1) !== panel) this.stack = [...this.stack.filter((each) => each !== panel), panel];
  }

  close(panel: PanelId): void {
    this.panels[panel] = false;
    if (panel === 'legend') remember('legendOpen', false);
  }

  toggle(panel: PanelId): void {
    if (this.panels[panel]) this.close(panel);
    else this.open(panel);
  }
}

export const view = new View();
