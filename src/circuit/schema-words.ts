import { z } from 'zod';
import { ID, ID_REMEDY, LIMITS, ONE_LINE, RESERVED } from './limits.ts';

// The page forbids building code from text, and zod would try to.
z.config({ jitless: true });

/** Parts a zod message into the two halves of a problem; see `problems.ts`. */
export const HALVES = '\n';
export const say = (what: string, remedy: string): string => what + HALVES + remedy;

export const id = z
  .string()
  .max(LIMITS.id, say(`This id is longer than ${LIMITS.id} characters.`, ID_REMEDY))
  .regex(ID, say('This is no id.', ID_REMEDY))
  .refine((text) => !RESERVED.has(text), say('This word cannot be an id.', 'Choose another id.'));

export const line = z
  .string()
  .max(LIMITS.label, say(`This text is longer than ${LIMITS.label} characters.`, 'Shorten it.'))
  .regex(
    ONE_LINE,
    say('This text holds a control character.', 'Remove tabs, line breaks and other control characters.'),
  );
