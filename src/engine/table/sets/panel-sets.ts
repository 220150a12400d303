import type { NetPump, Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { NONE } from '../../paths/diagrams/diagrams.ts';
import { motionSets } from '../../paths/diagrams/motion-sets.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import { oneMoveFrom } from '../../paths/diagrams/one-move.ts';
import { settledPathsOver } from '../../paths/diagrams/settled-paths.ts';
import type { SettledPaths } from '../../paths/diagrams/settled-paths.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { actuatorSets } from './actuator-sets.ts';
import type { ActuatorSets } from './actuator-sets.ts';
import { lineSets } from './line-sets.ts';
import type { LineOutcomeSets } from './line-sets.ts';
import { pumpSets } from './pump-sets.ts';
import { touchedSets } from './touched-sets.ts';
import type { TouchedSets } from './touched-sets.ts';
import { trapSets } from './trap-sets.ts';
import type { PanelState } from './trap-sets.ts';
import { ACTUATOR_VERDICTS, PUMP_VERDICTS } from '../words.ts';

const ACTUATOR_RESTS = ACTUATOR_VERDICTS.indexOf('rests on pressure');
const PUMP_RESTS = PUMP_VERDICTS.indexOf('rests on pressure');

/**
 * Outcomes of a panel of any size by open paths, each sought when it is first asked for: the sets that the
 * planes of a listed table would have without pressures. Dependent valves stand where open paths put them, and what
 * would do otherwise if one stood elsewhere is left to the pressures. Asking throws `TooManyNodes` where they do not fit.
 */
export class PanelSets {
  readonly net: Network;
  readonly conditions: PathConditions;
  readonly paths: SettledPaths;
  readonly #actuators = new Map<number, ActuatorSets>();
  readonly #pumps = new Map<number, readonly Diagram[]>();
  #motions: MotionSets | undefined;
  #lines: LineOutcomeSets | undefined;
  #traps: readonly (readonly Diagram[])[] | undefined;
  #touches: TouchedSets | undefined;
  #open: Diagram | undefined;
  #moving: Diagram | undefined;

  constructor(net: Network, conditions: PathConditions, paths: SettledPaths) {
    this.net = net;
    this.conditions = conditions;
    this.paths = paths;
  }

  get motions(): MotionSets {
    return (this.#motions ??= motionSets(this.net, this.conditions, this.paths));
  }

  /** By index of the verdict or note. */
  actuator(index: number): ActuatorSets {
    const known = this.#actuators.get(index);
    if (known) return known;
    const { verdicts, notes } = this.#firstActuator(index);
    const found = { verdicts: this.#doubted(verdicts, this.#touched?.actuators[index], ACTUATOR_RESTS), notes };
    this.#actuators.set(index, found);
    return found;
  }

  /** By index of the verdict. */
  pump(index: number): readonly Diagram[] {
    const known = this.#pumps.get(index);
    if (known) return known;
    const found = this.#doubted(this.#firstPump(index), this.#touched?.pumps[index], PUMP_RESTS);
    this.#pumps.set(index, found);
    return found;
  }

  /** Before other positions of the dependent valves are looked at. */
  #firstActuator(index: number): ActuatorSets {
    return actuatorSets(this.net, this.conditions, this.paths, this.motions, index);
  }

  #firstPump(index: number): readonly Diagram[] {
    return pumpSets(index, this.net.pumps[index] as NetPump, this.net, this.conditions, this.paths, this.motions);
  }

  /** Undefined without dependent valves. */
  get #touched(): TouchedSets | undefined {
    if (this.net.dependents.length === 0) return undefined;
    return (this.#touches ??= touchedSets(this.net, this.conditions, this.paths, [
      ...this.net.actuators.map((_, i) => this.#firstActuator(i).verdicts),
      ...this.net.pumps.map((_, i) => this.#firstPump(i)),
    ]));
  }

  #doubted(verdicts: readonly Diagram[], touched: Diagram | undefined, rests: number): readonly Diagram[] {
    const { sets } = this.paths;
    if (touched === undefined || touched === NONE) return verdicts;
    return verdicts.map((set, i) => (i === rests ? sets.or(set, touched) : sets.minus(set, touched)));
  }

  get lines(): LineOutcomeSets {
    return (this.#lines ??= lineSets(this.net, this.conditions, this.paths, this.motions));
  }

  /** By line and index of the reason. With the pumps stopped this also takes what they do while they run. */
  get traps(): readonly (readonly Diagram[])[] {
    const { net, conditions, paths } = this;
    const asked: PanelState = { paths, motions: this.motions, lines: this.lines };
    return (this.#traps ??= trapSets(
      net,
      conditions,
      (set) => oneMoveFrom(paths.sets, set),
      this.#running(asked),
      asked,
    ));
  }

  #running(asked: PanelState): PanelState {
    const { net, conditions, paths } = this;
    if (conditions.pumpsRunning) return asked;
    const where = { ...conditions, pumpsRunning: true };
    const found = settledPathsOver(net, where, paths.sets);
    const motions = motionSets(net, where, found);
    return { paths: found, motions, lines: lineSets(net, where, found, motions) };
  }

  /** Combinations in which something moves, or may move by pressures: oil may then pass where open paths see a dead end. */
  get moving(): Diagram {
    const { sets } = this.paths;
    return (this.#moving ??= this.motions.actuators.reduce(
      (all, { out, in: inward }) => sets.or(all, sets.or(out, inward)),
      this.open,
    ));
  }

  /** Combinations in which some motion is left to the pressures, or nothing settles it. */
  get open(): Diagram {
    const { sets, hunts } = this.paths;
    return (this.#open ??= [
      ...this.motions.actuators.map(({ rests }) => rests),
      ...(this.#touched?.actuators ?? []),
    ].reduce((all, set) => sets.or(all, set), hunts));
  }
}
