import type { Report } from './rows.ts';

/** Raised when a field changes its meaning or goes; new fields do not raise it. */
export const REPORT_VERSION = 1;

const entry = (key: string, value: unknown): string => `  ${JSON.stringify(key)}: ${JSON.stringify(value)}`;

/**
 * The whole table as one JSON object, a row to a line, so that it can be read by machines, compared by
 * line and written piece by piece. Keys are shown names.
 */
export function* writeJson(report: Report): Generator<string> {
  const head = [
    entry('spooltable', { version: report.version, report: REPORT_VERSION }),
    entry('circuit', report.circuit),
    entry('conditions', report.conditions),
    ...(report.loadCase === undefined ? [] : [entry('loadCase', report.loadCase)]),
    ...(report.figures ? [entry('units', report.figures.units)] : []),
    entry(
      'inputs',
      report.inputs.map((input) => ({ rest: null, ...input })),
    ),
    ...(report.dependents.length === 0
      ? []
      : [
          entry(
            'dependents',
            report.dependents.map((valve) => ({ rest: null, ...valve })),
          ),
        ]),
    entry('restRow', report.restRow),
  ];
  yield `{\n${head.join(',\n')},\n  "rows": [`;
  let between = '\n';
  for (const row of report.rows()) {
    yield `${between}    ${JSON.stringify(row)}`;
    between = ',\n';
  }
  const tail = [
    entry('notPermitted', report.notPermitted),
    entry('commandCombinations', report.commandCombinations),
    entry('findings', report.findings),
  ];
  yield `\n  ],\n${tail.join(',\n')}\n}\n`;
}
