import type { ActuatorVerdict, BlockedKind, LineClass, PumpVerdict, TrapReason } from '../words.ts';

/** What can hold or not hold in a combination. Items are numbered as in the table. */
export type Condition =
  | { readonly type: 'every' | 'any'; readonly of: readonly Condition[] }
  | { readonly type: 'not'; readonly of: Condition }
  /** The input stands in one of `positions` (bit p = position p). */
  | { readonly type: 'position'; readonly input: number; readonly positions: number }
  | { readonly type: 'actuator'; readonly actuator: number; readonly verdicts: readonly ActuatorVerdict[] }
  | { readonly type: 'pump'; readonly pump: number; readonly verdicts: readonly PumpVerdict[] }
  | { readonly type: 'line'; readonly line: number; readonly classes: readonly LineClass[] }
  | { readonly type: 'blocked'; readonly line: number; readonly kinds: readonly BlockedKind[] }
  | { readonly type: 'trapped'; readonly line: number; readonly reasons: readonly TrapReason[] }
  | FigureCondition;

export const COMPARISONS = ['over', 'under', 'at least', 'at most'] as const;
export type Comparison = (typeof COMPARISONS)[number];

/** Decided by the steady pressures of each row: Pa in a line or at a pump's outlet, m/s (rad/s) of an actuator whatever its direction. */
export type FigureCondition =
  | {
      readonly type: 'pressure';
      readonly of: 'line' | 'pump';
      readonly index: number;
      readonly is: Comparison;
      readonly than: number;
    }
  | { readonly type: 'speed'; readonly actuator: number; readonly is: Comparison; readonly than: number };

export interface Rule {
  /** As it was typed. */
  readonly text: string;
  /** Holds where the rule is broken. */
  readonly breaks: Condition;
}

/** The conditions within one that only pressures decide. */
export function figuresIn(condition: Condition): FigureCondition[] {
  switch (condition.type) {
    case 'every':
    case 'any':
      return condition.of.flatMap(figuresIn);
    case 'not':
      return figuresIn(condition.of);
    case 'pressure':
    case 'speed':
      return [condition];
    default:
      return [];
  }
}
