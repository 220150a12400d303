import type { Quantity } from '../base/units.ts';
import { parseQuantity } from '../base/units.ts';
import type { Part, Setting } from '../circuit/model.ts';
import type { PartProblem, SettingSpec } from './contract.ts';

type QuantityValue = Extract<SettingSpec['value'], { type: 'quantity' }>;
type NumberValue = Extract<SettingSpec['value'], { type: 'number' }>;
type ChoiceValue = Extract<SettingSpec['value'], { type: 'choice' }>;
type SwitchValue = Extract<SettingSpec['value'], { type: 'switch' }>;

export type QuantitySpec = SettingSpec & { readonly value: QuantityValue };
export type NumberSpec = SettingSpec & { readonly value: NumberValue };
export type ChoiceSpec = SettingSpec & { readonly value: ChoiceValue };
export type SwitchSpec = SettingSpec & { readonly value: SwitchValue };

export type ActuatorSpec = SettingSpec & {
  readonly value: Extract<SettingSpec['value'], { type: 'actuator' }>;
};

type Words = Pick<SettingSpec, 'id' | 'title' | 'help' | 'optional'>;

export const quantitySetting = (
  words: Words,
  quantity: Quantity,
  preset: string,
  limits: { readonly min?: string; readonly max?: string } = {},
): QuantitySpec => ({ ...words, value: { type: 'quantity', quantity, default: preset, ...limits } });

export const numberSetting = (
  words: Words,
  preset: number,
  limits: { readonly min?: number; readonly max?: number } = {},
): NumberSpec => ({ ...words, value: { type: 'number', default: preset, ...limits } });

export const choiceSetting = (words: Words, options: readonly string[], preset: string): ChoiceSpec => ({
  ...words,
  value: { type: 'choice', options, default: preset },
});

export const switchSetting = (words: Words, preset: boolean): SwitchSpec => ({
  ...words,
  value: { type: 'switch', default: preset },
});

/** Names an actuator of the circuit by its part id. */
export const actuatorSetting = (words: Words): ActuatorSpec => ({ ...words, value: { type: 'actuator', default: '' } });

export interface Reading {
  readonly si: number;
  /** What the user typed; undefined when the default stands in. */
  readonly typed?: Setting;
  /** True where the default stands in, because nothing or nothing usable was typed. */
  readonly assumed: boolean;
}

function parseSetting(typed: Setting, spec: SettingSpec): number | undefined {
  if (spec.value.type === 'quantity' && typeof typed === 'string') {
    const parsed = parseQuantity(typed, spec.value.quantity);
    return parsed.ok ? parsed.value : undefined;
  }
  if (spec.value.type === 'number') {
    if (typeof typed === 'number') return Number.isFinite(typed) ? typed : undefined;
    if (typeof typed === 'string') {
      const parsed = parseQuantity(typed, 'ratio');
      return parsed.ok ? parsed.value : undefined;
    }
  }
  return undefined;
}

function limitsOf(value: QuantityValue | NumberValue): { min: number; max: number } {
  if (value.type === 'number') return { min: value.min ?? -Infinity, max: value.max ?? Infinity };
  const read = (text: string | undefined, otherwise: number): number => {
    if (text === undefined) return otherwise;
    const parsed = parseQuantity(text, value.quantity);
    if (!parsed.ok) throw new Error(`limit "${text}" of a setting cannot be read`);
    return parsed.value;
  };
  return { min: read(value.min, -Infinity), max: read(value.max, Infinity) };
}

function defaultOf(value: QuantityValue | NumberValue): number {
  if (value.type === 'number') return value.default;
  const parsed = parseQuantity(value.default, value.quantity);
  if (!parsed.ok) throw new Error(`default "${value.default}" of a setting cannot be read`);
  return parsed.value;
}

/** A quantity or number of a part in SI. What cannot be used gives the default; `checkSettings` says so. */
export function readSetting(part: Part, spec: QuantitySpec | NumberSpec): Reading {
  const typed = part.settings?.[spec.id];
  if (typed !== undefined) {
    const si = parseSetting(typed, spec);
    const { min, max } = limitsOf(spec.value);
    if (si !== undefined && si >= min && si <= max) return { si, typed, assumed: false };
  }
  return { si: defaultOf(spec.value), assumed: typed !== undefined || spec.optional !== true };
}

export const readSi = (part: Part, spec: QuantitySpec | NumberSpec): number => readSetting(part, spec).si;

export function readChoice(part: Part, spec: ChoiceSpec): string {
  const typed = part.settings?.[spec.id];
  return typeof typed === 'string' && spec.value.options.includes(typed) ? typed : spec.value.default;
}

/** Part id; empty where none is named. */
export function readActuator(part: Part, spec: ActuatorSpec): string {
  const typed = part.settings?.[spec.id];
  return typeof typed === 'string' ? typed : '';
}

export function readSwitch(part: Part, spec: SwitchSpec): boolean {
  const typed = part.settings?.[spec.id];
  return typeof typed === 'boolean' ? typed : spec.value.default;
}

function checkOne(typed: Setting, spec: SettingSpec): PartProblem[] {
  const where = `settings.${spec.id}`;
  const { value } = spec;
  const title = spec.title.toLowerCase();
  switch (value.type) {
    case 'switch':
      if (typeof typed === 'boolean') return [];
      return [{ where, what: `${spec.title} is ${JSON.stringify(typed)}.`, remedy: 'Set it to true or false.' }];
    case 'actuator':
      if (typeof typed === 'string') return [];
      return [
        { where, what: `${spec.title} is ${JSON.stringify(typed)}.`, remedy: 'Give the id of an actuator as text.' },
      ];
    case 'choice':
      if (typeof typed === 'string' && value.options.includes(typed)) return [];
      return [
        {
          where,
          what: `${spec.title} cannot be ${JSON.stringify(typed)}.`,
          remedy: `Use one of: ${value.options.join(', ')}.`,
        },
      ];
    case 'quantity':
      if (typeof typed !== 'string') {
        return [
          {
            where,
            what: `${spec.title} is ${JSON.stringify(typed)}, without a unit.`,
            remedy: `Write it as text with its unit, such as "${value.default}".`,
          },
        ];
      }
  }
  if (value.type === 'quantity') {
    const parsed = parseQuantity(String(typed), value.quantity, where);
    if (!parsed.ok) return [...parsed.problems];
  }
  const si = parseSetting(typed, spec);
  if (si === undefined)
    return [
      {
        where,
        what: `${spec.title} is ${JSON.stringify(typed)}, not a number.`,
        remedy: `Write a number, such as ${value.default}.`,
      },
    ];
  const { min, max } = limitsOf(value);
  if (si < min)
    return [
      {
        where,
        what: `${spec.title} is ${typed}, below ${value.min}.`,
        remedy: `Give a ${title} of ${value.min} or more.`,
      },
    ];
  if (si > max)
    return [
      {
        where,
        what: `${spec.title} is ${typed}, above ${value.max}.`,
        remedy: `Give a ${title} of ${value.max} or less.`,
      },
    ];
  return [];
}

/** Everything wrong with the typed settings of a part; an unknown one is a warning and is kept. */
export function checkSettings(part: Part, specs: readonly SettingSpec[]): PartProblem[] {
  return Object.entries(part.settings ?? {}).flatMap(([id, typed]): PartProblem[] => {
    const spec = specs.find((candidate) => candidate.id === id);
    if (spec) return checkOne(typed, spec);
    const known = specs.map((candidate) => candidate.id).join(', ');
    return [
      {
        level: 'warning',
        where: `settings.${id}`,
        what: `There is no setting "${id}" here; it is kept but does nothing.`,
        remedy: known === '' ? 'This kind of part has no settings.' : `Known settings: ${known}.`,
      },
    ];
  });
}
