import type { LeverMove, MoveStage, VentAnswer } from '../analysis/results.ts';

/** `0 → a`, or the position that is passed. */
export const sayStage = ({ kind, names }: MoveStage): string =>
  kind === 'passing' ? `passing ${names.join('')}` : `between ${names.join(' and ')}`;

export const CROSSOVER_UNKNOWN = 'the crossover is not drawn';
export const IF_SHUT = 'if all ways are shut';
export const IF_JOINED = 'if all ways are joined';
export const EITHER = 'whether all ways are shut or all are joined';
export const NO_CHANGE = 'changes nothing that the table shows';
export const FOLLOWS = 'A spool follows by pilot pressure; what it does as it shifts is not worked out.';

export const sayLever = ({ label, from, to }: LeverMove): string => `${label}: ${from} → ${to}`;

export const saySprings = ({ springsTo }: LeverMove): string | undefined =>
  springsTo === undefined ? undefined : `Let go, it returns to ${springsTo}.`;

/** Whether the crossover matters to the move. */
export const isDoubtful = ({ stages }: LeverMove): boolean =>
  stages.some(({ ifShut, ifJoined }) => ifShut.length + ifJoined.length > 0);

export function sayVent(answer: VentAnswer): string {
  const { name, outcome, flows, slow, steps } = answer;
  const how = flows
    ? ' A pump feeds it all the same: what stands in it is what the flow to tank needs.'
    : slow
      ? ' It comes down only slowly, through the leakage of a stopped pump.'
      : '';
  if (outcome === 'never') return `No combination of positions opens ${name} to tank with the pumps as they are.`;
  if (outcome === 'now') return `${name} is open to tank as the levers stand.${how}`;
  return `${steps.length === 1 ? 'One move opens' : `${steps.length} moves open`} ${name} to tank; no shorter list does.${how}`;
}

/** Common practice and published safety alerts. */
export const VENT_WORDS: readonly string[] = [
  'Open to tank is not yet without pressure: support every load that can move, and verify at a gauge or test point.',
  'The bleed-down list lets down all lines together, with the pumps stopped. The documents of the machine, the local codes and qualified people go before both.',
];
/** How the notes on the way are to be taken. */
export const MOVE_WORDS: readonly string[] = [
  'What happens on the way lasts as long as the spool takes; its size depends on that time, on the oil and on what is entered. It belongs to the move, not to a state.',
  'Each move starts from this state by itself, with nothing left behind from earlier moves.',
];
