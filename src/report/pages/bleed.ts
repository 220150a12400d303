import type { BleedAnswer, BleedCaution, BleedLine, BleedStep, Conditions, LeftLine } from '../../analysis/results.ts';
import type { Circuit } from '../../circuit/model.ts';
import type { Paper } from '../../circuit/paper.ts';
import { CUT_SHORT, leftGroups, NOTHING_HELD, sayHeld, sayKeep, sayMove, sayPoints, sayVents } from '../bleed-words.ts';
import { sayConditions } from '../conditions.ts';
import type { Block } from './blocks.ts';
import type { PrintedPage, Section } from './pages.ts';
import { printedPages } from './pages.ts';

export interface BleedSheetSource {
  readonly circuit: Circuit;
  readonly conditions: Conditions;
  readonly answer: BleedAnswer;
  /** Label → position of the state in which the pumps stop. */
  readonly state: Readonly<Record<string, string>>;
  /** Those of them that nobody gave and that were taken as they stand at rest. */
  readonly assumed?: Readonly<Record<string, string>>;
}

export const BLEED_DEFERS =
  'The documents of the machine, the local codes and qualified people decide what is done; they go before this sheet. It is worked out from the open paths of the drawing and knows no wear, no stuck valve and no part that is not drawn.';

/** Order of isolation as 29 CFR 1910.147(d) names it; what is said of each step is common practice. */
export const ISOLATION_STEPS: readonly string[] = [
  'Know the energy: pumps, loads that can move, accumulators, springs, heat, and every other kind of energy of the machine.',
  'Shut down, in the order that the documents of the machine give.',
  'Isolate, by devices made for it. A lever or coil valve in its centre is not an isolating device.',
  'Lock, and tag. Each person has a lock of their own.',
  'Relieve or restrain stored energy: support or restrain every load that can move, then go through the moves below.',
  'Verify at every line that nothing is left, before anybody begins; keep verifying where pressure can build up again (a load, heat, a passing valve).',
];

export const BLEED_WARNINGS: readonly string[] = [
  'Oil from about 7 bar (100 psi) up can be injected through the skin: that is a surgical emergency, however small the wound looks.',
  'Cracking a fitting is not an accepted way to take pressure off.',
  'An accumulator keeps its pressure after the pumps have stopped. Unless it vents by itself, it is isolated positively and carries a warning (ISO 4413).',
];

/** For letter paper where the drawing is on letter or tabloid, else A4. */
export const bleedPaper = ({ paper }: Circuit): Paper =>
  paper !== undefined && /^(Letter|Tabloid)/.test(paper) ? 'Letter portrait' : 'A4 portrait';

/** The plan as sheets to take along to the machine and fill in by hand. */
export const bleedPages = (source: BleedSheetSource): PrintedPage[] =>
  printedPages({ circuit: source.circuit, paper: bleedPaper(source.circuit), sections: [bleedSection(source)] });

export function bleedSection({ circuit, conditions, answer, state, assumed = {} }: BleedSheetSource): Section {
  const from = `From row ${answer.row + 1}: ${pairs(state) || 'nothing to command'}; ${sayConditions({ ...conditions, pumps: 'stopped' }, circuit.loadCases)}`;
  return {
    document: 'Bleed-down sheet',
    shows: from,
    columns: 'one',
    blocks: [
      { type: 'heading', text: 'Bleed-down sheet', level: 1 },
      { type: 'text', text: BLEED_DEFERS, framed: true, weight: 600 },
      { type: 'fields', fields: [share('Machine, serial number', 3), share('Place', 2), share('Date and time', 2)] },
      { type: 'fields', fields: [share('Name', 3), share('Locks and tags, numbers', 2), share('Signature', 2)] },
      { type: 'gap', height: 0.4 },
      said(`${from}.`),
      ...(Object.keys(assumed).length > 0 ? [said(`Not given, taken at rest: ${pairs(assumed)}.`)] : []),
      ...BLEED_WARNINGS.map(caution),
      { type: 'heading', text: 'Order of isolation (29 CFR 1910.147(d))', level: 2 },
      ...ISOLATION_STEPS.map((text, i) => ticked(`${i + 1}. ${text}`)),
      ...cautions(answer.stopping, 'When the pumps stop: '),
      ...heldBlocks(answer),
      { type: 'gap', height: 0.6 },
      { type: 'fields', fields: [share('Verified by', 3), share('Date and time', 2), share('Signature', 2)] },
    ],
  };
}

function heldBlocks(answer: BleedAnswer): Block[] {
  if (answer.start.length === 0)
    return [{ type: 'heading', text: 'Lines under pressure', level: 2 }, said(NOTHING_HELD)];
  return [
    { type: 'heading', text: 'Lines under pressure with the pumps stopped', level: 2 },
    {
      type: 'table',
      columns: ['Line', 'Why', 'Where to measure', 'Read before', 'Read after'].map((head, i) => ({
        head,
        weight: i === 0 ? 600 : 400,
        ...(i > 2 && { least: 10, apart: true }),
      })),
      rows: answer.start.map((line) => [
        line.name,
        line.reasons.map(({ text }) => text).join(' '),
        whereToMeasure(line),
        '',
        '',
      ]),
    },
    ...(answer.steps.length > 0 ? [{ type: 'heading', text: 'Moves, in this order', level: 2 } as const] : []),
    ...answer.steps.map(stepBlock),
    ...leftBlocks(answer.left),
    ...pointBlocks(answer),
    ...(answer.proven ? [] : [said(CUT_SHORT)]),
  ];
}

const whereToMeasure = ({ measure }: BleedLine): string =>
  measure.length > 0 ? measure.join(', ') : 'no gauge or test point is drawn on it';

function stepBlock(step: BleedStep, i: number): Block {
  const keep = sayKeep(step);
  const vents = sayVents(step);
  return {
    type: 'together',
    blocks: [
      ...cautions(step.cautions, ''),
      ticked(`${i + 1}. ${sayMove(step)}${keep === undefined ? '' : ` ${keep}`}`),
      ...(vents === undefined ? [] : [ticked(vents, STEP_INDENT)]),
      said(sayHeld(step.held), STEP_INDENT),
      { type: 'gap', height: 0.4 },
    ],
  };
}

const STEP_INDENT = 1.8;

const leftBlocks = (left: readonly LeftLine[]): Block[] =>
  leftGroups(left).flatMap(({ head, lines }): Block[] => [
    { type: 'heading', text: head, level: 2 },
    ...lines.map((line) => ticked(`${line.name} (measure: ${whereToMeasure(line)}). ${line.remedy}`)),
  ]);

function pointBlocks({ points }: BleedAnswer): Block[] {
  if (!points) return [];
  return [
    { type: 'heading', text: sayPoints(points), level: 2 },
    ...cautions(points.cautions, ''),
    said(sayHeld(points.held)),
    ...points.steps.map(stepBlock),
    ...leftBlocks(points.left),
  ];
}

const share = (label: string, part: number): { label: string; share: number } => ({ label, share: part });
const said = (text: string, indent = 0): Block => ({ type: 'text', text, indent });
const ticked = (text: string, indent = 0): Block => ({ type: 'text', text, indent, mark: 'tick' });
const caution = (text: string): Block => ({ type: 'text', text, mark: { text: 'Caution' }, framed: true });
const cautions = (list: readonly BleedCaution[], head: string): Block[] => list.map(({ text }) => caution(head + text));

const pairs = (record: Readonly<Record<string, string>>): string =>
  Object.entries(record)
    .map(([label, position]) => `${label} ${position}`)
    .join(', ');
