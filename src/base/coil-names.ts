/** A coil as its valve knows it: `a` of V1. */
export interface CoilOf {
  /** Shown name of the valve. */
  readonly label: string;
  readonly name: string;
}

/**
 * Whether a coil's name is a tag of its own, such as `Y1` on electrical drawings (common practice), and not only the
 * letter that tells it from the others of its valve.
 */
export const isCoilTag = (name: string): boolean => [...name].length > 1;

/** Names of all coils of a circuit where no valve stands beside them: the tag if it is the only one, else `V1.a`. */
export function coilNames(coils: readonly CoilOf[]): string[] {
  const uses = new Map<string, number>();
  for (const { name } of coils) uses.set(name, (uses.get(name) ?? 0) + 1);
  return coils.map(({ label, name }) => (isCoilTag(name) && uses.get(name) === 1 ? name : `${label}.${name}`));
}
