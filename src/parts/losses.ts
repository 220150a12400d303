import type { Part } from '../circuit/model.ts';
import { quantitySetting, readSi, type QuantitySpec } from './settings.ts';

/** The rated flow and its pressure drop, by which a part says how much it takes away. */
export interface LossSpecs {
  readonly flow: QuantitySpec;
  readonly drop: QuantitySpec;
  readonly all: readonly [QuantitySpec, QuantitySpec];
}

export function lossSettings(flow: string, drop: string): LossSpecs {
  const flowSpec = quantitySetting(
    { id: 'ratedFlow', title: 'Rated flow', help: 'Flow at which the pressure drop is given.' },
    'flow',
    flow,
    { min: '0.01 L/min', max: '10000 L/min' },
  );
  const dropSpec = quantitySetting(
    { id: 'ratedDrop', title: 'Drop at rated flow', help: 'Pressure lost in one path at the rated flow.' },
    'pressure',
    drop,
    { min: '0.001 bar', max: '500 bar' },
  );
  return { flow: flowSpec, drop: dropSpec, all: [flowSpec, dropSpec] };
}

/** The same of a check beside something else that has its own. */
export function checkLossSettings(flow: string, drop: string): LossSpecs {
  const plain = lossSettings(flow, drop);
  const flowSpec = {
    ...plain.flow,
    id: 'checkFlow',
    title: 'Rated flow of the check',
    help: 'Flow at which the pressure drop of the check is given.',
  };
  const dropSpec = {
    ...plain.drop,
    id: 'checkDrop',
    title: 'Drop of the check',
    help: 'Pressure lost in the check at its rated flow.',
  };
  return { flow: flowSpec, drop: dropSpec, all: [flowSpec, dropSpec] };
}

/** m³/s at Pa. */
export const readLoss = (part: Part, specs: LossSpecs): { readonly flow: number; readonly drop: number } => ({
  flow: readSi(part, specs.flow),
  drop: readSi(part, specs.drop),
});
