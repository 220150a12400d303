/** What is written of plans in place of the check. */
export type PlanShows =
  | { readonly what: 'coils' }
  | { readonly what: 'st' }
  /** `lines`: names of lines; none = those at pumps and actuators. */
  | { readonly what: 'diagram'; readonly kind: 'step' | 'time'; readonly lines: readonly string[] };

export const PLAN_SHOW_OPTIONS = {
  coils: { type: 'boolean', default: false },
  st: { type: 'boolean', default: false },
  diagram: { type: 'string' },
  line: { type: 'string', multiple: true },
} as const;

/** Reads these options; a text says what is wrong with them. */
export function planShows(values: {
  readonly coils: boolean;
  readonly st: boolean;
  readonly diagram?: string | undefined;
  readonly line?: readonly string[] | undefined;
}): PlanShows | string | undefined {
  const { coils, st, diagram, line = [] } = values;
  if (Number(coils) + Number(st) + Number(diagram !== undefined) > 1)
    return 'Of --coils, --st and --diagram one is taken at a time.';
  if (line.length > 0 && diagram === undefined) return '--line chooses pressures of a --diagram.';
  if (coils) return { what: 'coils' };
  if (st) return { what: 'st' };
  if (diagram === undefined) return undefined;
  if (diagram !== 'step' && diagram !== 'time') return `--diagram takes step or time, not "${diagram}".`;
  return { what: 'diagram', kind: diagram, lines: line };
}
