import { version } from '../../../package.json';
import type { DiagramKind } from '../../drawing/step-diagram.ts';
import { writePlanText } from '../../report/plan.ts';
import { stepDiagramSvg } from '../../report/step-diagram.ts';
import { download, fileStem } from '../files/save.ts';
import { editor } from '../state/editor.svelte.ts';
import { plans } from '../state/plans.svelte.ts';
import { view } from '../state/view.svelte.ts';
import type { MenuItem } from '../ui/menu-item.ts';
import { diagramLines } from './diagram-lines.ts';

/** Files of the plan on show, as it was played last. */
export function exportItems(): MenuItem[] {
  const played = (plans.report?.trace.samples.length ?? 0) > 0;
  return [
    { heading: 'Diagram, black on white' },
    { text: 'Displacement-step, SVG', disabled: !played, run: () => saveDiagram('step') },
    { text: 'Displacement-time, SVG', disabled: !played, run: () => saveDiagram('time') },
    { heading: 'Report' },
    { text: 'Text', disabled: plans.report === undefined, run: saveReport },
    { text: 'Structured text: see coil conditions', run: () => (plans.page = 'logic') },
  ];
}

const stem = (): string => fileStem(`${editor.circuit.name} ${plans.plan?.name ?? ''}`);

function saveDiagram(kind: DiagramKind): void {
  const { report } = plans;
  if (!report) return;
  const svg = stepDiagramSvg(`${editor.circuit.name}: ${report.name}`, report.trace, {
    kind,
    units: view.units,
    theme: 'print',
    standalone: true,
    lines: plans.lines ?? diagramLines(report.trace),
  });
  download(`${stem()}-${kind}.svg`, svg, 'image/svg+xml');
}

function saveReport(): void {
  const { report } = plans;
  if (!report) return;
  const { name, loadCases } = editor.circuit;
  const text = [
    ...writePlanText({ version, circuit: name, ...(loadCases && { loadCases }), units: view.units, reports: [report] }),
  ].join('');
  download(`${stem()}.txt`, text, 'text/plain');
}

export const saveStructuredText = (text: string): void => download(`${stem()}.st`, text, 'text/plain');
