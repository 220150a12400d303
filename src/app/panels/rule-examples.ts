import type { Circuit } from '../../circuit/model.ts';
import { labelOf } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import { actuatorsOf } from '../state/actuators.ts';
import { inputsOf } from '../state/inputs.ts';

/** In double quotes, unless it is plainly one word that is no word of a rule. */
function quoted(name: string): string | undefined {
  if (/^[A-Z][A-Z0-9]*$/.test(name) && name.length > 1 && !WORDS.test(name)) return name;
  return name.includes('"') ? undefined : `"${name}"`;
}
const WORDS =
  /^(and|or|not|when|while|whenever|if|only|unless|is|at|every|all|each|any|some|no|a|an|never|always|rest|rests|lever|valve|coil|actuator|cylinder|motor|pump|line)s?$/i;

/** Up to three rules to begin with, made of the circuit's own names; none that it has already. */
export function ruleExamples(circuit: Circuit): string[] {
  const [first, second] = actuatorsOf(circuit).flatMap(({ label, motion }) => {
    const name = quoted(label);
    return name === undefined ? [] : [{ name, motion }];
  });
  const pump = circuit.parts.findLast((part) => kindOf(part.kind)?.elements(part).some(({ type }) => type === 'pump'));
  const pumpName = pump && quoted(labelOf(pump));
  const rests = inputsOf(circuit).some(({ rest }) => rest !== undefined);
  const has = new Set((circuit.rules ?? []).map(({ text }) => text));
  return [
    // "moves in" takes in what a load does, which "retracts" alone does not.
    ...(first && second
      ? [`never ${first.name} ${first.motion === 'linear' ? 'moves in' : 'moves'} while ${second.name} moves`]
      : []),
    ...(pumpName !== undefined && rests ? [`always ${pumpName} unloaded when every lever rests`] : []),
    ...(first && rests ? ['never any line trapped by load when every lever rests'] : []),
  ].filter((text) => !has.has(text));
}
