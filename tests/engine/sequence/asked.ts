import { networkOf } from '../../../src/analysis/analyse.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { BleedModel } from '../../../src/engine/sequence/bleed-model.ts';
import { planBleed, planWithPoints } from '../../../src/engine/sequence/bleed.ts';
import type { BleedMove, BleedPlan, PointPlan } from '../../../src/engine/sequence/bleed.ts';
import type { BleedOptions } from '../../../src/engine/sequence/bleed-search.ts';
import type { MoveCaution } from '../../../src/engine/sequence/cautions.ts';
import { loseCoils, runningPaths } from '../../../src/engine/sequence/power-loss.ts';
import type { PowerLossRows } from '../../../src/engine/sequence/power-loss.ts';
import type { Network } from '../../../src/network/network.ts';
import { rowOf } from './reference.ts';

/** A bleed-down plan that is asked by names, as people would. */
export class BleedAsked {
  readonly net: Network;
  readonly model: BleedModel;

  constructor(circuit: Circuit) {
    this.net = networkOf(circuit);
    this.model = new BleedModel(this.net, {
      pumpsRunning: true,
      places: this.net.actuators.map(() => 'between' as const),
    });
  }

  /** `V1=a V2=0`; valves not named stand at rest. */
  row(state: string): number {
    const positions = this.net.inputs.map((input) => input.rest ?? 0);
    for (const word of state.split(' ').filter((w) => w !== '')) {
      const [label = '', name = ''] = word.split('=');
      const input = this.net.inputs.findIndex((entry) => this.label(entry.part) === label);
      const position = this.net.inputs[input]?.positions.indexOf(name) ?? -1;
      if (position < 0) throw new Error(`no such position: ${word}`);
      positions[input] = position;
    }
    return rowOf(this.net, positions);
  }

  plan(state: string, options?: BleedOptions): BleedPlan {
    return planBleed(this.model, this.row(state), options);
  }

  withPoints(state: string): PointPlan | undefined {
    return planWithPoints(this.model, this.plan(state));
  }

  powerLoss(state: string): PowerLossRows {
    return loseCoils(this.model, runningPaths(this.model), this.row(state));
  }

  label(part: number): string {
    return this.net.parts[part]?.label ?? '';
  }

  lines(list: readonly (number | { readonly line: number })[]): string[] {
    return list.map((entry) => this.net.lines[typeof entry === 'number' ? entry : entry.line]?.name ?? '');
  }

  /** `V1 0>b: drop C1 in, spread P`. */
  say(move: BleedMove): string {
    const input = this.net.inputs[move.input];
    const cautions = this.cautions(move.cautions).join(', ');
    const text = `${this.label(input?.part ?? -1)} ${input?.positions[move.from] ?? ''}>${input?.positions[move.to] ?? ''}`;
    return cautions === '' ? text : `${text}: ${cautions}`;
  }

  cautions(list: readonly MoveCaution[]): string[] {
    return list.map((caution) => {
      switch (caution.kind) {
        case 'drop':
          return `${caution.slow ? 'slow drop' : 'drop'} ${this.label(this.net.actuators[caution.actuator]?.part ?? -1)} ${caution.way}`;
        case 'driven':
          return `driven ${this.label(this.net.actuators[caution.actuator]?.part ?? -1)} ${caution.way}`;
        case 'discharge':
          return `discharge ${this.label(this.net.accumulators[caution.accumulator]?.part ?? -1)}`;
        case 'leak':
        case 'spread':
          return `${caution.kind} ${this.lines(caution.lines).join(' ')}`;
        default:
          return caution.kind;
      }
    });
  }
}
