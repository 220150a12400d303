import { z } from 'zod';
import { PAPERS } from './paper.ts';
import { plan } from './plan-schema.ts';
import { LIMITS, ONE_LINE, PORT_REF, RESERVED, SEVERAL_LINES } from './limits.ts';
import { id, line, say } from './schema-words.ts';

export const FORMAT = 'spooltable-circuit';
export const VERSION = 1;

const portRef = z
  .string()
  .max(2 * LIMITS.id + 1, say('This port is too long.', 'Write part and port with a dot between them, such as "V1.A".'))
  .regex(PORT_REF, say('This is no port.', 'Write part and port with a dot between them, such as "V1.A".'))
  .refine(
    (text) => !text.split('.').some((word) => RESERVED.has(word)),
    say('This word cannot name a part or port.', 'Choose another id.'),
  );

const far = say(`This point lies off the sheet.`, `Use numbers from -${LIMITS.coordinate} to ${LIMITS.coordinate}.`);
const coordinate = z.number().min(-LIMITS.coordinate, far).max(LIMITS.coordinate, far);
const spot = z
  .tuple([coordinate, coordinate], say('This is no point.', 'Write two numbers, [x, y], in modules.'))
  .meta({ description: 'x and y in modules (1 module = 2.5 mm on paper), x right, y down' });

const index = z.int().min(0, say('A position cannot be negative.', 'Count positions from 0.'));
const setting = z.union([line, z.number(), z.boolean()], {
  error: say(
    'This is no setting.',
    `Write a text of one line, at most ${LIMITS.label} characters, a finite number, true or false.`,
  ),
});

const valve = z.looseObject({
  ports: z.array(z.looseObject({ id, side: z.enum(['top', 'bottom']) })),
  positions: z.array(z.looseObject({ name: line, paths: z.array(line) })),
  crossovers: z.array(z.array(line)).optional(),
  rest: index.optional(),
  left: z.array(z.enum(['lever', 'pedal', 'button', 'coil', 'spring', 'detent', 'hand', 'roller', 'pilot'])),
  right: z.array(z.enum(['lever', 'pedal', 'button', 'coil', 'spring', 'detent', 'hand', 'roller', 'pilot'])),
  coils: z.array(z.looseObject({ name: line, position: index })).optional(),
});

const sheetId = id.meta({ description: 'id of the sheet that it stands on; the first when left out' });

const sheet = z.looseObject({
  id,
  name: line.min(1, say('The name is empty.', 'Write a name, such as "Power unit".')),
});

const part = z.looseObject({
  id,
  kind: line.min(1, say('The kind is empty.', 'Write a part kind, such as "tank".')),
  label: line.min(1, say('The label is empty.', 'Write a label or leave the field out.')).optional(),
  code: line.optional(),
  sheet: sheetId.optional(),
  at: spot.optional(),
  turn: z
    .union(
      [z.literal(0), z.literal(90), z.literal(180), z.literal(270)],
      say('This is no quarter turn.', 'Use 0, 90, 180 or 270.'),
    )
    .optional(),
  flip: z.boolean().optional(),
  settings: z.record(line, setting).optional(),
  valve: valve.optional(),
});

const connection = z.looseObject({
  id,
  from: portRef,
  to: portRef,
  name: line.min(1, say('The name is empty.', 'Write a name or leave the field out.')).optional(),
  use: z.enum(['working', 'pilot', 'drain']).optional(),
  size: line.optional().meta({ description: 'size of tube or hose, such as "12x1.5"; drawn only' }),
  bends: z
    .array(spot)
    .max(LIMITS.bends, say('Too many bends.', `Use at most ${LIMITS.bends}.`))
    .optional(),
});

const label = z.looseObject({ id, sheet: sheetId.optional(), at: spot, text: line });

const group = z.looseObject({
  id,
  name: line.min(1, say('The name is empty.', 'Write a name, such as "Block 1".')),
  parts: z
    .array(id)
    .max(LIMITS.parts, say('Too many parts.', `Use at most ${LIMITS.parts}.`))
    .meta({ description: 'ids of the parts inside the enclosure' }),
});

const readyMadeValve = z.looseObject({
  id,
  title: line.min(1, say('The title is empty.', 'Write a name for the valve.')),
  kind: line.min(1, say('The kind is empty.', 'Leave it out for a directional valve.')).optional(),
  valve,
});

const rule = z.looseObject({
  id,
  text: z
    .string()
    .min(1, say('The rule is empty.', 'Write a rule, such as "never C1 moves while C2 moves", or leave it out.'))
    .max(LIMITS.rule, say(`This rule is longer than ${LIMITS.rule} characters.`, 'Say it in several rules.'))
    .regex(
      ONE_LINE,
      say('This rule holds a control character.', 'Remove tabs, line breaks and other control characters.'),
    ),
});

const loadCase = z.looseObject({
  id,
  name: line,
  loads: z.record(id, z.record(line, setting)).meta({ description: 'part id → settings that stand in for its own' }),
});

export const fileSchema = z
  .looseObject({
    format: z.literal(FORMAT),
    version: z.literal(VERSION),
    name: line,
    title: z.record(line, line).optional(),
    paper: z.enum(PAPERS).optional(),
    notes: z
      .string()
      .max(LIMITS.notes, say(`The notes are longer than ${LIMITS.notes} characters.`, 'Shorten them.'))
      .regex(SEVERAL_LINES, say('The notes hold a control character.', 'Keep only text, tabs and line breaks.'))
      .optional(),
    sheets: z
      .array(sheet)
      .min(1, say('The list of sheets is empty.', 'Name one sheet at least, or leave the list out.'))
      .max(LIMITS.sheets, say('Too many sheets.', `Use at most ${LIMITS.sheets}.`))
      .optional()
      .meta({ description: 'sheets of the drawing, in their order; left out, there is one' }),
    parts: z.array(part).max(LIMITS.parts),
    connections: z.array(connection).max(LIMITS.connections),
    labels: z
      .array(label)
      .max(LIMITS.labels, say('Too many labels.', `Use at most ${LIMITS.labels}.`))
      .optional(),
    groups: z
      .array(group)
      .max(LIMITS.groups, say('Too many blocks.', `Use at most ${LIMITS.groups}.`))
      .optional(),
    readyMadeValves: z
      .array(readyMadeValve)
      .max(LIMITS.readyMadeValves, say('Too many ready-made valves.', `Use at most ${LIMITS.readyMadeValves}.`))
      .optional(),
    rules: z
      .array(rule)
      .max(LIMITS.rules, say('Too many rules.', `Use at most ${LIMITS.rules}.`))
      .optional(),
    loadCases: z
      .array(loadCase)
      .max(LIMITS.loadCases, say('Too many load cases.', `Use at most ${LIMITS.loadCases}.`))
      .optional(),
    plans: z
      .array(plan)
      .max(LIMITS.plans, say('Too many step plans.', `Use at most ${LIMITS.plans}.`))
      .optional(),
  })
  .meta({
    title: 'Spooltable circuit',
    description: 'A hydraulic circuit: parts, and connections between their ports.',
  });

export type FileCircuit = z.infer<typeof fileSchema>;
export type FileSheet = z.infer<typeof sheet>;
export type FilePart = z.infer<typeof part>;
export type FileConnection = z.infer<typeof connection>;
export type FileLabel = z.infer<typeof label>;
export type FileGroup = z.infer<typeof group>;
export type FileReadyMadeValve = z.infer<typeof readyMadeValve>;
export type FileRule = z.infer<typeof rule>;
export type FileLoadCase = z.infer<typeof loadCase>;
export type FileValve = z.infer<typeof valve>;

const fields = (shape: object): ReadonlySet<string> => new Set(Object.keys(shape));
/** The fields that this version knows, for each kind of object in the file. */
export const KNOWN = {
  circuit: fields(fileSchema.shape),
  sheet: fields(sheet.shape),
  part: fields(part.shape),
  connection: fields(connection.shape),
  label: fields(label.shape),
  group: fields(group.shape),
  readyMadeValve: fields(readyMadeValve.shape),
  rule: fields(rule.shape),
  loadCase: fields(loadCase.shape),
  plan: fields(plan.shape),
  step: fields(plan.shape.steps.element.shape),
  valve: fields(valve.shape),
  valvePort: fields(valve.shape.ports.element.shape),
  valvePosition: fields(valve.shape.positions.element.shape),
  coil: new Set(['name', 'position']) as ReadonlySet<string>,
} as const;

/** The file as a JSON Schema (draft 2020-12). It cannot tell ids that clash or connections that lead nowhere. */
export function jsonSchema(): Record<string, unknown> {
  return { ...z.toJSONSchema(fileSchema, { io: 'input', target: 'draft-2020-12' }) };
}
