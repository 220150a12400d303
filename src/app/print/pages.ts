import { version } from '../../../package.json';
import { DEFAULT_PAPER } from '../../circuit/paper.ts';
import { hasSheets, sheetsOf } from '../../circuit/sheets.ts';
import { TEXT_SIZES } from '../../drawing/palette.ts';
import type { Scene } from '../../drawing/scene.ts';
import type { Block } from '../../report/pages/blocks.ts';
import { bleedPages } from '../../report/pages/bleed.ts';
import type { DrawingSheet, PrintedPage, Section } from '../../report/pages/pages.ts';
import { hasRoomBeside, joined, printedPages } from '../../report/pages/pages.ts';
import {
  chartSection,
  findingsSection,
  notesSection,
  partListBlock,
  partListSection,
} from '../../report/pages/sections.ts';
import { makeReport } from '../../report/rows.ts';
import type { Report } from '../../report/rows.ts';
import type { BleedAnswer } from '../../worker/client.ts';
import { linePressures } from '../sheet/line-pressures.ts';
import { drawing } from '../sheet/sheet-drawing.svelte.ts';
import { editor } from '../state/editor.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { view } from '../state/view.svelte.ts';
import type { Choices } from './choice.svelte.ts';

/** A sheet as it stands in the row on show, with the pressures that the screen writes at its lines, or plain at rest. */
export function sceneOf(sheet: string, how: 'row' | 'plain'): Scene {
  const { scene, pressureSpots } = drawing.sheet(sheet, how);
  if (!view.sheetFigures || how === 'plain') return scene;
  const pressures = linePressures(drawing.assumed).flatMap(
    ({ line, text, assumed: isAssumed }): Scene['labels'][number][] => {
      const spot = pressureSpots.get(line);
      if (!spot) return [];
      return [
        {
          role: 'line',
          owner: `pressure ${line}`,
          at: spot.at,
          align: spot.align,
          runs: [{ text, size: TEXT_SIZES.code, weight: 500, tone: 'ink', assumed: isAssumed }],
        },
      ];
    },
  );
  return { ...scene, labels: [...scene.labels, ...pressures] };
}

/** Every sheet of the circuit, in their order. */
export const drawnScenes = (how: 'row' | 'plain'): Scene[] =>
  sheetsOf(editor.circuit).map(({ id }) => sceneOf(id, how));

function drawingSheets(how: 'row' | 'plain', beside: Block | undefined): DrawingSheet[] {
  const { circuit } = editor;
  return sheetsOf(circuit).map(({ id, name }, i): DrawingSheet => {
    const scene = sceneOf(id, how);
    return {
      scene,
      shows: sayShown(how),
      key: how === 'row',
      ...(beside && i === 0 && { beside }),
      ...(hasSheets(circuit) && { one: { id, name, zoned: (zoneOf) => drawing.zoned(scene, zoneOf) } }),
    };
  });
}

/** `V1 raise, V2 hold`. */
function sayPositions(positionOf: (index: number, part: string) => number): string {
  return session.inputs
    .map(({ part, label, positions }, i) => `${label} ${positions[positionOf(i, part)] ?? ''}`)
    .join(', ');
}

/** What the drawing shows. */
export function sayShown(how: Choices['drawing']): string {
  if (how !== 'row') return 'Every valve at rest';
  const row = session.table ? `Row ${(session.row + 1).toLocaleString('en')}: ` : '';
  const levers = sayPositions((_, part) => session.positionOf(part));
  return `${row}${levers === '' ? '' : `${levers}; `}pumps ${session.conditions.pumps}`;
}

function report(): Report | undefined {
  const { answer } = session;
  if (!answer) return undefined;
  const { table, findings, circuit, conditions } = answer;
  return makeReport({ version, circuit, conditions, table, findings });
}

/** All sheets that are chosen. */
export function chosenPages(choices: Choices): PrintedPage[] {
  const { circuit } = editor;
  const paper = circuit.paper ?? DEFAULT_PAPER;
  const table = choices.chart || choices.findings ? report() : undefined;
  const list = partListBlock(circuit);
  const beside =
    choices.partsOn === 'drawing' &&
    choices.drawing !== 'none' &&
    circuit.parts.length > 0 &&
    hasRoomBeside(paper, list);
  const prose: (Section | undefined)[] = [
    choices.notes ? notesSection(circuit) : undefined,
    choices.findings && table ? findingsSection(table.findings) : undefined,
    choices.partsOn !== 'none' && !beside && circuit.parts.length > 0 ? partListSection(circuit) : undefined,
  ];
  return printedPages({
    circuit,
    paper,
    ...(choices.drawing !== 'none' && { drawing: drawingSheets(choices.drawing, beside ? list : undefined) }),
    sections: [
      ...(choices.chart && table ? [chartSection(table)] : []),
      ...joined(prose.flatMap((section) => section ?? [])),
    ],
  });
}

/** The bleed-down list as sheets to take along. */
export function pagesOfPlan(answer: BleedAnswer): PrintedPage[] {
  const state = session.inputs.map(({ label, positions }, i): [string, string] => [
    label,
    positions[answer.positions[i] ?? 0] ?? '',
  ]);
  const { circuit, conditions } = session.answer ?? { circuit: editor.circuit, conditions: session.conditions };
  return bleedPages({ circuit, conditions, answer, state: Object.fromEntries(state) });
}
