import type { Part } from '../circuit/model.ts';
import { kindOf } from './catalogue.ts';

/** Ids of the settings by which a part names another part. */
export const namingSettings = (part: Part): string[] =>
  (kindOf(part.kind)?.settings ?? []).filter(({ value }) => value.type === 'actuator').map(({ id }) => id);
