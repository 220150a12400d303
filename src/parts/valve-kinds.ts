/** Kinds whose ways, positions and operators are data (`Part.valve`), drawn as a strip of boxes. */
export const VALVE_KINDS: ReadonlySet<string> = new Set([
  'directional-valve',
  'pilot-valve',
  'two-stage-valve',
  'roller-valve',
]);

export const isStripValve = (kind: string | undefined): boolean => kind !== undefined && VALVE_KINDS.has(kind);
