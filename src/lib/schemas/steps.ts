import { z } from 'zod';
import { CLEARABLE, MOST_TIMES, OPERATIONS, REGISTERS, WAYS } from '@/lib/mechanism/steps';
import { oneOf, truth, wholeNumber } from './layout';
import { LIMITS } from './limits';

/** No register is longer than 32 wheels with a mark each, spaces between; what is longer is no register. */
const registerText = z.string({ error: 'Give text: digits, highest wheel first.' }).max(200, {
  error: 'This is longer than any register.',
});

/** What was read after a step, glyphs highest wheel first. */
export const readingSchema = z
  .strictObject({ result: registerText.optional(), counter: registerText.optional() }, { error: 'Give an object.' })
  .meta({
    id: 'Reading',
    description:
      'What stood in the windows after the step, highest wheel first: 0 to 9; a digit with ~ after it where the ' +
      'wheel stands between this numeral and the next; ? where it could not be read.',
  });

const read = readingSchema.optional();

/** One thing done to the machine, with the reading taken after it. */
export const stepSchema = z
  .discriminatedUnion(
    'do',
    [
      z.strictObject({ do: z.literal('set'), slides: registerText, read }),
      z.strictObject({
        do: z.literal('turn'),
        way: oneOf(WAYS),
        times: wholeNumber(1, MOST_TIMES).optional().meta({ default: 1 }),
        read,
      }),
      z.strictObject({ do: z.literal('shift'), to: wholeNumber(1, 32), read }),
      z.strictObject({ do: z.literal('reverse'), on: truth, read }),
      z.strictObject({ do: z.literal('clear'), what: oneOf(CLEARABLE), read }),
    ],
    { error: `Give an object whose "do" is one of ${OPERATIONS.join(', ')}.` },
  )
  .meta({
    id: 'Step',
    description: 'One operation, with the reading taken after it if there was one.',
  });

export const stepsSchema = z.array(stepSchema, { error: 'Give a list of steps.' }).max(LIMITS.callSteps, {
  error: `At most ${LIMITS.callSteps} steps are taken in one call; send the rest in another.`,
});

/** Registers to start from; one left out starts at zero. */
export const startSchema = z
  .strictObject({ result: registerText.optional(), counter: registerText.optional() }, { error: 'Give an object.' })
  .meta({
    id: 'Start',
    description: 'Registers to start from, digits only. One left out starts at zero.',
  });

/** A wheel of a register. */
export const placeSchema = z
  .strictObject({ register: oneOf(REGISTERS), wheel: wholeNumber(1, 32) }, { error: 'Give an object.' })
  .meta({
    id: 'Place',
    description: 'One wheel; wheels count from 1 = units.',
  });
