import { findings, networkOf, tabulate } from '../analysis/analyse.ts';
import { unlimited } from '../base/budget.ts';
import type { Circuit } from '../circuit/model.ts';
import { hasSheets, sheetsOf } from '../circuit/sheets.ts';
import { faceOf, referencesOf, withZones } from '../drawing/faces.ts';
import { placeMissing } from '../drawing/place.ts';
import { routeAll } from '../drawing/routing.ts';
import { buildScene } from '../drawing/scene.ts';
import { StateTable } from '../engine/table/state-table.ts';
import { partListHead, partListRows, writePartListCsv } from '../report/part-list.ts';
import { writePrintDocument } from '../report/pages/document.ts';
import { sceneStateOf } from '../report/pages/looks.ts';
import { joined, printedPages } from '../report/pages/pages.ts';
import type { DrawingSheet } from '../report/pages/pages.ts';
import { chartSection, findingsSection, notesSection, partListSection } from '../report/pages/sections.ts';
import { makeReport } from '../report/rows.ts';
import { padEnd, plain, widthOf } from '../report/width.ts';
import type { Written } from './bleed.ts';
import { conditionsOf } from './conditions.ts';
import { EXIT } from './failure.ts';
import type { PartsFormat, Printed, PrintCommand } from './print-options.ts';
import { listedRow, stateOf } from './standing.ts';

/** The sheets of a circuit as one web page. */
export function printed(command: PrintCommand, circuit: Circuit, version: string): Written {
  const { file, only, state, paper } = command;
  const has = (what: Printed): boolean => only.includes(what);
  const conditions = conditionsOf(command, circuit);
  const net = networkOf(circuit, conditions);
  const standing = stateOf(file, net, state);
  const row = listedRow(file, net, standing.positions);
  const needsTable = has('chart') || has('findings') || state.length > 0;
  const table = needsTable ? new StateTable(tabulate(circuit, conditions, unlimited)) : undefined;
  const running =
    conditions.pumps === 'running' || !has('findings')
      ? table
      : new StateTable(tabulate(circuit, { ...conditions, pumps: 'running' }, unlimited));
  const report =
    table &&
    makeReport({
      version,
      circuit,
      conditions,
      table,
      findings: has('findings') && running ? findings(circuit, running, conditions) : [],
    });
  const notes = has('notes') ? notesSection(circuit) : undefined;
  const withState = table !== undefined && state.length > 0;
  const drawings = (): DrawingSheet[] => {
    const placed = placeMissing(circuit);
    const references = referencesOf(placed);
    const levers = Object.entries(standing.state).map(([label, position]) => `${label} ${position}`);
    return sheetsOf(placed).map(({ id, name }): DrawingSheet => {
      const face = faceOf(placed, id, references, () => '');
      const scene = buildScene(face, routeAll(face), withState ? sceneStateOf(table, row) : {});
      return {
        scene,
        shows: withState ? `Row ${row + 1}: ${levers.join(', ')}; pumps ${conditions.pumps}` : 'Every valve at rest',
        key: withState,
        ...(hasSheets(placed) && {
          one: { id, name, zoned: (zoneOf) => withZones(scene, placed, references, zoneOf) },
        }),
      };
    });
  };
  const pages = printedPages({
    circuit,
    ...(paper && { paper }),
    ...(has('drawing') && { drawing: drawings() }),
    sections: [
      ...(has('chart') && report ? [chartSection(report)] : []),
      ...joined([
        ...(notes ? [notes] : []),
        ...(has('findings') && report ? [findingsSection(report.findings)] : []),
        ...(has('parts') ? [partListSection(circuit)] : []),
      ]),
    ],
  });
  return { pieces: writePrintDocument(circuit.name, pages), exit: EXIT.done };
}

/** The part list as aligned text or CSV. */
export function parts({ format }: { readonly format: PartsFormat }, circuit: Circuit): Written {
  return { pieces: format === 'csv' ? writePartListCsv(circuit) : partsText(circuit), exit: EXIT.done };
}

function* partsText(circuit: Circuit): Generator<string> {
  const head = partListHead(circuit);
  const rows = [head, ...partListRows(circuit)].map((cells) => cells.map(plain));
  const widths = head.map((_, i) => Math.max(...rows.map((cells) => widthOf(cells[i] ?? ''))));
  for (const cells of rows) {
    const line = cells.map((cell, i) => padEnd(cell, widths[i] ?? 0));
    yield `${line.join('  ').trimEnd()}\n`;
  }
}
