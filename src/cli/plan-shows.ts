import { networkOf } from '../analysis/analyse.ts';
import { coilLogic } from '../analysis/coil-logic.ts';
import { checkPlan } from '../analysis/plan.ts';
import { diagramLines } from '../analysis/plan-lines.ts';
import type { CoilLogic, Conditions } from '../analysis/results.ts';
import type { UnitSystem } from '../base/units.ts';
import type { Circuit } from '../circuit/model.ts';
import { writeCoilLogicJson, writeCoilLogicText } from '../report/coil-logic.ts';
import { stepDiagramSvg } from '../report/step-diagram.ts';
import type { Written } from './bleed.ts';
import { EXIT, Failure, sayProblems } from './failure.ts';
import type { PlanShows } from './plan-options.ts';

export interface ShownPlans {
  readonly file: string;
  readonly ids: readonly string[];
  readonly units: UnitSystem;
  readonly format: 'text' | 'json';
  readonly conditions: Conditions;
}

/** Writes it. A program or a diagram is of one plan. */
export function showPlans(
  shows: PlanShows,
  { file, ids, units, format, conditions }: ShownPlans,
  circuit: Circuit,
  version: string,
): Written {
  const [id] = ids;
  if (shows.what === 'coils') {
    const source = { version, circuit: circuit.name, logic: ids.map((one) => logicOf(file, circuit, one)) };
    return { pieces: format === 'json' ? [writeCoilLogicJson(source)] : writeCoilLogicText(source), exit: EXIT.done };
  }
  if (id === undefined || ids.length > 1)
    throw new Failure(`${file}: ${ids.length} step plans are there. Choose one with --plan: ${ids.join(', ')}.`);
  if (shows.what === 'st') return { pieces: [logicOf(file, circuit, id).text.signals], exit: EXIT.done };
  const net = networkOf(circuit);
  const known = net.lines.slice(0, net.shown).map(({ name }) => name);
  const missing = shows.lines.find((name) => !known.includes(name));
  if (missing !== undefined)
    throw new Failure(`${file}: --line: There is no line "${missing}". Use one of ${known.join(', ')}.`);
  const report = checkPlan(circuit, id, conditions, undefined, { powerLoss: false });
  const svg = stepDiagramSvg(`${circuit.name}: ${report.name}`, report.trace, {
    kind: shows.kind,
    units,
    theme: 'print',
    standalone: true,
    lines: shows.lines.length > 0 ? shows.lines : diagramLines(net),
  });
  return { pieces: [svg], exit: report.good ? EXIT.done : EXIT.checkFailed };
}

function logicOf(file: string, circuit: Circuit, id: string): CoilLogic {
  const found = coilLogic(circuit, id);
  if (!found.ok) throw new Failure(sayProblems(file, found.problems));
  return found.value;
}
