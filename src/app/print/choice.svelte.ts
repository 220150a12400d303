import { recall, remember } from '../state/remembered.ts';

export interface Choices {
  /** Circuit drawing: as it stands in the row on show, at rest without marks, or not at all. */
  readonly drawing: 'row' | 'plain' | 'none';
  readonly partsOn: 'drawing' | 'sheet' | 'none';
  readonly chart: boolean;
  readonly findings: boolean;
  readonly notes: boolean;
  readonly look: 'print' | 'light';
  readonly dpi: 150 | 300 | 600;
}

const USUAL: Choices = {
  drawing: 'row',
  partsOn: 'sheet',
  chart: true,
  findings: true,
  notes: true,
  look: 'print',
  dpi: 300,
};

/** What is printed; kept between visits, no part of the circuit. */
class Printing {
  choices = $state.raw<Choices>({ ...USUAL, ...recall<Partial<Choices>>('print', {}) });

  choose(change: Partial<Choices>): void {
    this.choices = { ...this.choices, ...change };
    remember('print', this.choices);
  }
}

export const printing = new Printing();
