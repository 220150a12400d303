import type { ActuatorVerdict, BlockedKind, LineClass, PumpVerdict, TrapReason } from '../words.ts';
import type { Condition, FigureCondition } from './condition.ts';

/** Combinations in which something surely holds, and those in which it may hold (these include the sure ones). */
export interface Truth<S> {
  readonly sure: S;
  readonly maybe: S;
}

/** Sets of combinations, and what is known of the outcomes in them. */
export interface RuleSource<S> {
  readonly none: S;
  readonly all: S;
  readonly and: (a: S, b: S) => S;
  readonly or: (a: S, b: S) => S;
  readonly not: (a: S) => S;
  /** The input stands in one of `positions` (bit p = position p). */
  readonly position: (input: number, positions: number) => S;
  readonly actuator: (index: number, verdicts: readonly ActuatorVerdict[]) => Truth<S>;
  readonly pump: (index: number, verdicts: readonly PumpVerdict[]) => Truth<S>;
  readonly line: (index: number, classes: readonly LineClass[]) => Truth<S>;
  readonly blocked: (index: number, kinds: readonly BlockedKind[]) => Truth<S>;
  readonly trapped: (index: number, reasons: readonly TrapReason[]) => Truth<S>;
  readonly figure: (condition: FigureCondition) => Truth<S>;
}

/**
 * Where a condition holds, in the three-valued logic of Kleene: a verdict that is left to pressures or is
 * undetermined may be any, so it neither fulfils nor contradicts a condition for sure.
 */
export function evaluate<S>(source: RuleSource<S>, condition: Condition): Truth<S> {
  switch (condition.type) {
    case 'every':
      return condition.of
        .map((part) => evaluate(source, part))
        .reduce((a, b) => ({ sure: source.and(a.sure, b.sure), maybe: source.and(a.maybe, b.maybe) }), {
          sure: source.all,
          maybe: source.all,
        });
    case 'any':
      return condition.of
        .map((part) => evaluate(source, part))
        .reduce((a, b) => ({ sure: source.or(a.sure, b.sure), maybe: source.or(a.maybe, b.maybe) }), {
          sure: source.none,
          maybe: source.none,
        });
    case 'not': {
      const { sure, maybe } = evaluate(source, condition.of);
      return { sure: source.not(maybe), maybe: source.not(sure) };
    }
    case 'position': {
      const set = source.position(condition.input, condition.positions);
      return { sure: set, maybe: set };
    }
    case 'actuator':
      return source.actuator(condition.actuator, condition.verdicts);
    case 'pump':
      return source.pump(condition.pump, condition.verdicts);
    case 'line':
      return source.line(condition.line, condition.classes);
    case 'blocked':
      return source.blocked(condition.line, condition.kinds);
    case 'trapped':
      return source.trapped(condition.line, condition.reasons);
    case 'pressure':
    case 'speed':
      return source.figure(condition);
  }
}
