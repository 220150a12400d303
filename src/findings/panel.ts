import type { Diagram } from '../engine/paths/diagrams/diagrams.ts';
import { NONE } from '../engine/paths/diagrams/diagrams.ts';
import { supportOf } from '../engine/table/fold/influence.ts';
import type { PanelSets } from '../engine/table/sets/panel-sets.ts';
import { ACTUATOR_VERDICTS, LINE_CLASSES, PUMP_VERDICTS } from '../engine/table/words.ts';
import type { ActuatorVerdict, LineClass, PumpVerdict } from '../engine/table/words.ts';
import { INWARD, OUTWARD } from './evidence.ts';
import type { Finding } from './finding.ts';

/** A fault as sets show it, on a panel with too many combinations to list. */
type Fault = (panel: Panel) => readonly Finding[];

/** Sets by their words, and what is said of them. */
class Panel {
  readonly net: PanelSets['net'];
  readonly #sets: PanelSets;
  readonly rest: readonly number[];

  constructor(sets: PanelSets) {
    this.#sets = sets;
    this.net = sets.net;
    this.rest = sets.net.inputs.map(({ rest }) => rest ?? 0);
  }

  actuator(index: number, ...verdicts: ActuatorVerdict[]): Diagram {
    return this.#union(this.#sets.actuator(index).verdicts, ACTUATOR_VERDICTS, verdicts);
  }

  pump(index: number, ...verdicts: PumpVerdict[]): Diagram {
    return this.#union(this.#sets.pump(index), PUMP_VERDICTS, verdicts);
  }

  line(index: number, ...classes: LineClass[]): Diagram {
    return this.#union(this.#sets.lines.classes[index] ?? [], LINE_CLASSES, classes);
  }

  #union<W>(found: readonly Diagram[], words: readonly W[], wanted: readonly W[]): Diagram {
    return wanted.reduce(
      (all: Diagram, word) => this.#sets.paths.sets.or(all, found[words.indexOf(word)] ?? NONE),
      NONE,
    );
  }

  atRest(set: Diagram): boolean {
    return this.#sets.paths.sets.has(set, this.rest);
  }

  /** `9 of 3,486,784,401 combinations (V1 at a, the others at rest)`, and that combination. */
  witness(set: Diagram): { readonly said: string; readonly example: readonly number[] } {
    const { sets } = this.#sets.paths;
    const example = sets.example(set, this.rest) ?? this.rest;
    const moved = this.net.inputs.flatMap(({ part, positions, rest }, i) =>
      example[i] === (rest ?? 0) ? [] : [`${this.label(part)} at ${positions[example[i] ?? 0] ?? ''}`],
    );
    const such =
      moved.length === 0 ? 'all levers at rest among them' : `such as ${moved.join(', ')}, the others at rest`;
    return {
      said: `${sets.count(set).toLocaleString('en')} of ${sets.total.toLocaleString('en')} combinations (${such})`,
      example,
    };
  }

  label(part: number): string {
    return this.net.parts[part]?.label ?? '';
  }

  mark(part: number): Pick<Finding, 'parts' | 'rows' | 'rowCount'> {
    const id = this.net.parts[part]?.id;
    return { parts: id === undefined ? [] : [id], rows: [], rowCount: 0 };
  }

  /** Per input the positions between which nothing at all differs. */
  alike(): readonly (readonly (readonly number[])[])[] {
    const all = [
      ...this.net.actuators.flatMap((_, i) => this.#sets.actuator(i).verdicts),
      ...this.net.pumps.flatMap((_, i) => this.#sets.pump(i)),
      ...this.#sets.lines.classes.flat(),
    ];
    return supportOf(this.#sets.paths.sets, all).alike;
  }
}

const deadHeaded: Fault = (panel) =>
  panel.net.pumps.flatMap(({ part, outlet }, i): Finding[] => {
    const set = panel.pump(i, 'dead-headed');
    if (set === NONE) return [];
    const { said, example } = panel.witness(set);
    return [
      {
        ...panel.mark(part),
        rule: 'dead-headed-pump',
        level: 'danger',
        title: `${panel.label(part)} can be dead-headed`,
        what: `In ${said} its flow has no open path, moves nothing, and no pressure valve is within reach. Pressure climbs until something gives way.`,
        remedy: 'Fit a relief valve at the pump outlet, before anything that can shut it off.',
        lines: outlet < panel.net.shown ? [outlet] : [],
        example,
      },
    ];
  });

const MOVED: readonly ActuatorVerdict[] = [
  'moved in by load',
  'moved out by load',
  'driven A→B by load',
  'driven B→A by load',
  'floats',
];

const loadNotHeld: Fault = (panel) =>
  panel.net.actuators.flatMap(({ part, push }, i): Finding[] => {
    if (push.by !== 'load' || push.way === 'none' || !panel.atRest(panel.actuator(i, ...MOVED))) return [];
    const verdict = MOVED.find((word) => panel.atRest(panel.actuator(i, word))) ?? '';
    return [
      {
        ...panel.mark(part),
        rule: 'load-not-held',
        level: 'danger',
        title: `Nothing holds the load of ${panel.label(part)} at rest`,
        what: `With every lever at rest it is ${verdict}.`,
        remedy:
          'Usual remedy: a lock check or counterbalance valve on the loaded side, close to the cylinder. Prop the load mechanically before working under it.',
        lines: [],
        example: panel.rest,
      },
    ];
  });

const overRelief: Fault = (panel) =>
  panel.net.pumps.flatMap(({ part }, i): Finding[] =>
    panel.atRest(panel.pump(i, 'over relief'))
      ? [
          {
            ...panel.mark(part),
            rule: 'over-relief-at-rest',
            level: 'caution',
            title: `${panel.label(part)} blows over its relief at rest`,
            what: 'With every lever at rest all of its flow goes over the relief valve and turns to heat.',
            remedy: 'Usual ways out: a bypass centre, an unloading valve, or a pressure-compensated pump.',
            lines: [],
            example: panel.rest,
          },
        ]
      : [],
  );

const reach: Fault = (panel) =>
  panel.net.actuators.flatMap(({ part, rotary }, i): Finding[] => {
    const some = (...verdicts: ActuatorVerdict[]): boolean => panel.actuator(i, ...verdicts) !== NONE;
    if (some('rests on pressure', 'undetermined')) return [];
    const [out, inward] = [some(...OUTWARD), some(...INWARD)];
    if (out && inward) return [];
    const [goes, back] = rotary ? ['turn A→B', 'turn B→A'] : ['extend', 'retract'];
    const base = { ...panel.mark(part), rule: 'actuator-reach', level: 'caution' as const, lines: [] };
    const label = panel.label(part);
    if (!out && !inward)
      return [
        {
          ...base,
          title: `Nothing moves ${label}`,
          what: `No combination makes it ${goes} or ${back}.`,
          remedy: 'Check its lines, and that a valve can both feed it and let it out.',
        },
      ];
    if (rotary || some('floats')) return [];
    const [can, cannot] = out ? [goes, back] : [back, goes];
    return [
      {
        ...base,
        title: `${label} can ${can} but not ${cannot}`,
        what: `Some combination makes it ${can}; none makes it ${cannot}, and it floats in none.`,
        remedy: 'Give the other side a feed, or a spring or load that brings it back over a path to tank.',
      },
    ];
  });

const unventable: Fault = (panel) =>
  panel.net.lines.slice(0, panel.net.shown).flatMap(({ name }, line): Finding[] => {
    const shut = panel.line(line, 'cut off');
    if (shut === NONE || panel.line(line, 'vented', 'flows to tank') !== NONE) return [];
    const { said, example } = panel.witness(shut);
    return [
      {
        rule: 'unventable-line',
        level: 'caution',
        title: `No lever position vents ${name}`,
        what: `It is cut off in ${said} and has no open path to tank in any. Pressure that gets in stays in.`,
        remedy:
          'Usually a bleed valve or a test point with a hose to tank is added there. Never crack a fitting to let pressure off; follow the machine’s documents, local codes and qualified people.',
        parts: [],
        lines: [line],
        rows: [],
        rowCount: 0,
        example,
      },
    ];
  });

const openPorts: Fault = (panel) =>
  panel.net.openPorts.map(({ part, port, level, what, remedy }) => ({
    ...panel.mark(part),
    rule: 'open-port',
    level,
    title: `${panel.label(part)}.${port} is left open`,
    what: `${what} It is taken as plugged.`,
    remedy,
    lines: [],
  }));

const changesNothing: Fault = (panel) =>
  panel.alike().flatMap((groups, i): Finding[] => {
    const input = panel.net.inputs[i];
    const [p, q] = groups.find((group) => group.length > 1) ?? [];
    if (input === undefined || p === undefined || q === undefined) return [];
    return [
      {
        ...panel.mark(input.part),
        rule: 'position-changes-nothing',
        level: 'note',
        title: `${panel.label(input.part)}: ${input.positions[p] ?? ''} and ${input.positions[q] ?? ''} do the same`,
        what: 'No actuator, pump or line differs between these two positions, whatever the other levers do.',
        remedy: 'Check its connections, or use a valve with fewer positions.',
        lines: [],
      },
    ];
  });

const FAULTS: readonly Fault[] = [deadHeaded, loadNotHeld, overRelief, reach, unventable, openPorts, changesNothing];
const LEVELS = ['danger', 'caution', 'note'];

/**
 * Design faults of a panel of any size, from exact sets of open paths with the pumps running; the dangers first. Faults
 * that only pressures show, and those of valves that follow from pressures, are not among them.
 */
export function findPanelFaults(sets: PanelSets): Finding[] {
  const panel = new Panel(sets);
  return FAULTS.flatMap((fault) => fault(panel)).sort((a, b) => LEVELS.indexOf(a.level) - LEVELS.indexOf(b.level));
}
