import { z } from 'zod';
import { COIL_REF, LIMITS, ONE_LINE } from './limits.ts';
import { id, line, say } from './schema-words.ts';

const quantity = line.min(1, say('This quantity is empty.', 'Write a number and its unit, or leave the field out.'));
const place = line
  .min(1, say('This place is empty.', 'Write in, out, or a distance from in, such as "120 mm".'))
  .meta({ description: 'in, out, or a distance from in such as "120 mm"' });
const few = (noun: string): [number, string] => [
  LIMITS.named,
  say(`Too many ${noun}.`, `Use at most ${LIMITS.named}.`),
];
const coilRef = line.regex(
  COIL_REF,
  say('This is no coil.', 'Write valve and coil with a dot between them, such as "V1.a".'),
);
const named = <T extends z.ZodType>(value: T, noun: string) => {
  const [most, told] = few(noun);
  return z.record(id, value).refine((entries) => Object.keys(entries).length <= most, told);
};

const ends = z.discriminatedUnion(
  'by',
  [
    z.looseObject({ by: z.literal('motion') }),
    z.looseObject({ by: z.literal('sensor'), actuator: id, at: place }),
    z.looseObject({ by: z.literal('pressure'), switch: id, turns: z.enum(['on', 'off']) }),
    z.looseObject({ by: z.literal('time'), after: quantity }),
  ],
  say('This does not end a step.', 'Use an object with "by": "motion", "sensor", "pressure" or "time".'),
);

const step = z.looseObject({
  id,
  name: line.optional(),
  coils: z
    .array(coilRef)
    .max(...few('coils'))
    .optional(),
  levers: named(line, 'levers').optional().meta({ description: 'part id → position name' }),
  stopped: z
    .array(id)
    .max(...few('pumps'))
    .optional(),
  expect: z
    .string()
    .max(LIMITS.rule, say(`These motions are longer than ${LIMITS.rule} characters.`, 'Say them in several steps.'))

    .regex(
      ONE_LINE,
      say('This text holds a control character.', 'Remove tabs, line breaks and other control characters.'),
    )
    .optional(),
  ends,
  within: quantity.optional().meta({ description: 'time that the step may take at most' }),
});

export const plan = z.looseObject({
  id,
  name: line,
  start: named(place, 'actuators').optional().meta({ description: 'part id → in, out, or a distance from in' }),
  standing: named(line, 'valves').optional().meta({ description: 'part id → position name before the first step' }),
  loadCase: id.optional(),
  steps: z.array(step).max(LIMITS.steps, say('Too many steps.', `Use at most ${LIMITS.steps}.`)),
});

export type FilePlan = z.infer<typeof plan>;
export type FileStep = z.infer<typeof step>;
export type FileStepEnd = z.infer<typeof ends>;

/** The fields that a step end of each kind knows. */
export const KNOWN_ENDS: Readonly<Record<FileStepEnd['by'], ReadonlySet<string>>> = {
  motion: new Set(['by']),
  sensor: new Set(['by', 'actuator', 'at']),
  pressure: new Set(['by', 'switch', 'turns']),
  time: new Set(['by', 'after']),
};
