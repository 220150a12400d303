import { NEAR_IDEAL } from './laws.ts';
import { lossOf } from './part-data.ts';
import type { CylinderData, Loss, MotorData, ValveData } from './part-data.ts';
import { TANK } from './problem.ts';
import type { Branch, BranchKind, Coupler, FlowProblem, Load, Pilot, Pump, Signal } from './problem.ts';

export { lossOf } from './part-data.ts';
export type { CylinderData, Loss, MotorData, ValveData } from './part-data.ts';

const free = { forward: 0, backward: 0, lo: -Infinity, hi: Infinity };
const oneWay = { backward: -Infinity, lo: 0, hi: Infinity };

/** Puts a problem together in the terms of the trade. Every method returns the branch number. */
export class FlowBuilder {
  readonly #lines: string[] = [];
  readonly #pumps: Pump[] = [];
  readonly #branches: Branch[] = [];
  readonly #couplers: Coupler[] = [];
  readonly #leak: number;

  /** `leak`: m³/s per Pa from every line to tank. */
  constructor(leak: number = NEAR_IDEAL.leak) {
    this.#leak = leak;
  }

  /** A new line; its number. */
  line(name: string): number {
    return this.#lines.push(name) - 1;
  }

  openPath(id: string, from: number, to: number, loss?: Loss, on = true): number {
    return this.#between(id, 'path', from, to, { ...free, ...lossOf(loss) }, on);
  }

  /** Both ways; what it passes is chosen by the user, so it is no mere loss. `undefined` = shut. */
  throttle(id: string, from: number, to: number, loss: Loss | undefined, on = true): number {
    return this.#between(id, 'throttle', from, to, { ...free, ...lossOf(loss) }, on && loss !== undefined);
  }

  /** Free from → to once `cracking` Pa is passed. */
  check(id: string, from: number, to: number, cracking = 0, loss?: Loss, on = true): number {
    return this.#between(id, 'check', from, to, { ...oneWay, forward: cracking, ...lossOf(loss) }, on);
  }

  /** Opens at `setting` Pa over its outlet; `override` Pa per m³/s. */
  relief(
    id: string,
    line: number,
    to: number,
    setting: number,
    override: number = NEAR_IDEAL.override,
    on = true,
  ): number {
    return this.#between(id, 'relief', line, to, { ...oneWay, forward: setting, r: override, k: 0 }, on);
  }

  /**
   * Main stage of a pilot-operated relief valve: opens from → to as far as `from` passes `pilot` by `pressure` Pa.
   * It counts as a relief valve.
   */
  pilotRelief(id: string, from: number, to: number, pilot: number, pressure: number, override?: number): number {
    const signals = [
      { line: from, factor: 1 },
      { line: pilot, factor: -1 },
    ];
    const data = { setting: pressure, ...(override !== undefined && { gradient: override }) };
    return this.#valve(id, from, to, undefined, this.#pilot(data, signals), 'relief');
  }

  /** Passes at most `flow` m³/s from → to whatever the pressure; back freely only if `reverseFree`. */
  flowControl(id: string, from: number, to: number, flow: number, loss?: Loss, reverseFree = false, on = true): number {
    const law = reverseFree ? { ...free, hi: flow } : { ...oneWay, forward: 0, hi: flow };
    return this.#between(id, 'flow control', from, to, { ...law, ...lossOf(loss) }, on);
  }

  /** Both ways in proportion to the drop, m³/s per Pa: leakage past spools, pistons, a stopped pump. */
  leakage(id: string, from: number, to: number, conductance: number, on = true): number {
    return this.#between(id, 'leakage', from, to, { ...free, r: 1 / conductance, k: 0 }, on);
  }

  /** Charged accumulator: holds its line near `pressure` Pa. Its flow is what it takes in. */
  accumulator(id: string, line: number, pressure: number, loss?: Loss, on = true): number {
    return this.#between(
      id,
      'accumulator',
      line,
      TANK,
      { ...free, forward: pressure, backward: pressure, ...lossOf(loss) },
      on,
    );
  }

  /** m³/s into `line`, at any pressure. The number is that of the pump. */
  pumpFixed(id: string, line: number, flow: number): number {
    return this.#pumps.push({ id, line, flow }) - 1;
  }

  /** Delivers `flow` up to its `setting`, where it is fully destroked; `band` Pa below it destroking begins. */
  pumpCompensated(
    id: string,
    line: number,
    flow: number,
    setting: number,
    band = setting * NEAR_IDEAL.compensatorBand,
  ): number {
    const law = { ...oneWay, forward: setting - band, r: band / Math.max(flow, Number.MIN_VALUE), k: 0, hi: flow };
    const compensator = this.#between(id, 'compensator', line, TANK, flow > 0 ? law : { ...law, r: 1 }, flow > 0);
    return this.#pumps.push({ id, line, flow, compensator }) - 1;
  }

  /** Stands still and lets its line down through its own leakage, m³/s per Pa; 0 = tight. */
  pumpStopped(id: string, line: number, leakage: number): number {
    if (leakage > 0) this.leakage(`${id} leakage`, line, TANK, leakage);
    return this.#pumps.push({ id, line, flow: 0 }) - 1;
  }

  cylinder(id: string, a: number, b: number, data: CylinderData): number {
    const drag = data.drag ?? NEAR_IDEAL.cylinderDrag * Math.max(data.areaA, data.areaB);
    const { r, k } = data.ports ? lossOf(data.ports) : { r: 0, k: 0 };
    // A drop of r·q + k·q² in each port, on its own area, as a force of the speed.
    const square = data.areaA ** 2 + data.areaB ** 2;
    const cube = data.areaA ** 3 + data.areaB ** 3;
    return this.#actuator(
      id,
      'cylinder',
      a,
      b,
      data.areaA,
      data.areaB,
      { r: drag + r * square, k: k * cube },
      data.load ?? {},
      data.at,
    );
  }

  motor(id: string, a: number, b: number, data: MotorData): number {
    const drain = data.drain ?? TANK;
    if (data.leakage !== undefined && data.leakage > 0) this.leakage(`${id} leakage`, a, b, data.leakage);
    if (data.drainLeakage !== undefined && data.drainLeakage > 0) {
      this.leakage(`${id} drain A`, a, drain, data.drainLeakage);
      this.leakage(`${id} drain B`, b, drain, data.drainLeakage);
    }
    const drag = data.drag ?? NEAR_IDEAL.motorDrag * data.displacement;
    return this.#actuator(
      id,
      'motor',
      a,
      b,
      data.displacement,
      data.displacement,
      { r: drag, k: 0 },
      data.load ?? {},
      undefined,
    );
  }

  /** Opens from → to when its inlet, less the reference, is above the setting; shut the other way. */
  sequenceValve(id: string, from: number, to: number, data: ValveData): number {
    return this.#piloted(id, from, to, data, [{ line: from, factor: 1 }]);
  }

  /** Opens from → to when the pilot line is above the setting. */
  unloadingValve(id: string, from: number, to: number, pilot: number, data: ValveData): number {
    return this.#piloted(id, from, to, data, [{ line: pilot, factor: 1 }]);
  }

  /** Holds a load in line `load`: opens load → valve when load + ratio·pilot, less the reference, is above the setting. Free valve → load. */
  counterbalance(id: string, load: number, valve: number, pilot: number, ratio: number, data: ValveData): number {
    this.check(`${id} check`, valve, load, 0, data.loss);
    return this.#piloted(id, load, valve, data, [
      { line: load, factor: 1 },
      { line: pilot, factor: ratio },
    ]);
  }

  /** Closes from → to when the outlet, less the reference, comes up to the setting. */
  reducingValve(id: string, from: number, to: number, data: ValveData): number {
    const back = data.reference === undefined ? [] : [{ line: data.reference, factor: 1 }];
    const signals = [{ line: to, factor: -1 }, ...back];
    const pilot = { signals, setting: -data.setting, gradient: data.gradient ?? NEAR_IDEAL.pilotGradient };
    return this.#valve(id, from, to, data.loss, pilot);
  }

  /** Opens from → to as far as Σ factor·p passes the setting, whatever lines it senses; shut the other way. */
  pressureValve(
    id: string,
    from: number,
    to: number,
    signals: readonly Signal[],
    data: Omit<ValveData, 'reference'>,
  ): number {
    return this.#piloted(id, from, to, data, [...signals]);
  }

  /** Free valve → cylinder; back when ratio·(pilot − valve) beats cylinder − valve + cracking. */
  lockCheck(
    id: string,
    valve: number,
    cylinder: number,
    pilot: number,
    ratio: number,
    data: { cracking?: number; gradient?: number; loss?: Loss } = {},
  ): number {
    const cracking = data.cracking ?? 0;
    this.check(`${id} check`, valve, cylinder, cracking, data.loss);
    const signals = [
      { line: pilot, factor: ratio },
      { line: cylinder, factor: -1 },
      { line: valve, factor: 1 - ratio },
    ];
    return this.#valve(id, cylinder, valve, data.loss, {
      signals,
      setting: cracking,
      gradient: data.gradient ?? NEAR_IDEAL.pilotGradient,
    });
  }

  /** Back through a shuttle valve, from → to: while `to` is not below `other` by more than the ball needs to come over. */
  shuttleBack(id: string, from: number, to: number, other: number, loss?: Loss): number {
    const signals = [
      { line: to, factor: 1 },
      { line: other, factor: -1 },
    ];
    return this.#valve(id, from, to, loss, { signals, setting: -NEAR_IDEAL.ball, gradient: NEAR_IDEAL.ballGradient });
  }

  /** Two motors on one shaft: of what enters at `inlet`, `share` goes to the first outlet; `loss` Pa per m³/s. */
  divider(id: string, inlet: number, outlets: readonly [number, number], share: number, loss: number): void {
    this.#couplers.push({ id, lines: [inlet, ...outlets], factors: [1, -share, share - 1], r: loss });
  }

  build(): FlowProblem {
    return {
      lines: [...this.#lines],
      pumps: [...this.#pumps],
      branches: [...this.#branches],
      ...(this.#couplers.length > 0 && { couplers: [...this.#couplers] }),
      leak: this.#leak,
    };
  }

  #between(
    id: string,
    kind: BranchKind,
    from: number,
    to: number,
    law: Pick<Branch, 'forward' | 'backward' | 'r' | 'k' | 'lo' | 'hi'>,
    on: boolean,
  ): number {
    return this.#branches.push({ id, kind, a: from, b: to, ca: 1, cb: -1, ...law, on }) - 1;
  }

  #actuator(
    id: string,
    kind: 'cylinder' | 'motor',
    a: number,
    b: number,
    ca: number,
    cb: number,
    loss: { r: number; k: number },
    load: Load,
    at: 'in' | 'out' | undefined,
  ): number {
    const pressing = (load.pressing ?? 0) + (load.spring ?? 0);
    const against = (load.resisting ?? 0) + (load.friction ?? 0);
    return (
      this.#branches.push({
        id,
        kind,
        a,
        b,
        ca,
        cb: -cb,
        load,
        on: true,
        forward: pressing + against,
        backward: pressing - against,
        ...loss,
        lo: at === 'in' ? 0 : -Infinity,
        hi: at === 'out' ? 0 : Infinity,
      }) - 1
    );
  }

  #piloted(id: string, from: number, to: number, data: ValveData, signals: Signal[]): number {
    return this.#valve(id, from, to, data.loss, this.#pilot(data, signals));
  }

  #pilot(data: ValveData, signals: Signal[]): Pilot {
    const all = data.reference === undefined ? signals : [...signals, { line: data.reference, factor: -1 }];
    return { signals: all, setting: data.setting, gradient: data.gradient ?? NEAR_IDEAL.pilotGradient };
  }

  #valve(
    id: string,
    from: number,
    to: number,
    loss: Loss | undefined,
    pilot: Pilot,
    kind: BranchKind = 'pressure valve',
  ): number {
    const { r, k } = lossOf(loss);
    return (
      this.#branches.push({
        id,
        kind,
        a: from,
        b: to,
        ca: 1,
        cb: -1,
        ...oneWay,
        forward: 0,
        r,
        k,
        on: true,
        pilot,
      }) - 1
    );
  }
}
