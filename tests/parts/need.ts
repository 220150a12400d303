import { kindOf } from '../../src/parts/catalogue.ts';
import type { PartKind } from '../../src/parts/contract.ts';

/** A value that a test takes for granted; its absence fails the test with a plain message. */
export function need<T>(value: T | undefined): T {
  if (value === undefined) throw new Error('a value that the test needs is not there');
  return value;
}

export const needKind = (kind: string): PartKind => need(kindOf(kind));
