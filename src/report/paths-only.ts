/**
 * What an answer of open paths alone says of itself, after a semicolon. `followers`: labels of valves that pressures
 * or actuators move.
 */
export function pathsOnly(followers: readonly string[] = []): string {
  const answered = '; too many combinations to list, so open paths alone have answered';
  if (followers.length === 0) return answered;
  const [stand, they] = followers.length === 1 ? ['stands', 'it'] : ['stand', 'they'];
  const last = followers.at(-1) as string;
  const list = followers.length === 1 ? last : `${followers.slice(0, -1).join(', ')} and ${last}`;
  return `${answered}; ${list} ${stand} where those put ${they === 'it' ? 'it' : 'them'}, and what would change if one stood elsewhere is left to the pressures`;
}
