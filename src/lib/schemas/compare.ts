import { z } from 'zod';
import { VERDICTS } from '@/lib/comparison/compare';
import { REGISTERS } from '@/lib/mechanism/steps';
import { layoutSchema } from './layout';
import { placeSchema, startSchema, stepsSchema } from './steps';

/** What `POST /api/v1/compare` takes. */
export const compareSchema = z
  .strictObject(
    {
      layout: layoutSchema.optional(),
      start: startSchema.optional(),
      steps: stepsSchema,
      excluded: z
        .array(placeSchema, { error: 'Give a list of wheels.' })
        .max(64, { error: 'No machine has more than 64 wheels.' })
        .optional()
        .meta({
          description: 'Wheels that count neither for nor against the machine.',
        }),
    },
    { error: 'Give an object.' },
  )
  .meta({
    id: 'Comparison',
    description: 'What was done to the machine and what was read.',
  });
export type CompareBody = z.infer<typeof compareSchema>;

/** One wheel of one reading, judged. */
export const judgedWheelSchema = z
  .object({
    wheel: z.int().meta({ description: '1 = units.' }),
    read: z.string().meta({ description: 'The glyph as read.' }),
    expected: z.int().meta({
      description: 'The digit from the start: is the register right?',
    }),
    expectedFromLast: z.int().nullable().meta({
      description: 'The digit from the last reading: what went wrong in this step? null where several are possible.',
    }),
    verdict: z.enum(VERDICTS).meta({ description: 'Judged against expectedFromLast.' }),
    stepsOff: z.int().min(-4).max(5).nullable().meta({
      description: 'Steps off expectedFromLast; null where not one digit.',
    }),
    carryDue: z.boolean().nullable().meta({
      description: 'Whether the wheel below passed its edge; null = unknown.',
    }),
    carryMade: z.boolean().nullable().meta({ description: 'Whether the carry was made; null = unknown.' }),
  })
  .meta({ id: 'Wheel', description: 'One wheel of one reading, judged.' });

const judgedReadingSchema = z
  .object({
    step: z.int().meta({ description: 'Index in steps.' }),
    result: z.array(judgedWheelSchema).meta({ description: 'From wheel 1 up.' }),
    counter: z.array(judgedWheelSchema).meta({ description: 'From wheel 1 up.' }),
  })
  .meta({ id: 'JudgedReading' });

/** What `POST /api/v1/compare` answers. */
export const comparedSchema = z
  .object({
    agrees: z.boolean().meta({
      description: 'false when any wheel of any reading differs or stands between.',
    }),
    readings: z.array(judgedReadingSchema),
    firstFault: z
      .object({ step: z.int(), register: z.enum(REGISTERS), wheel: z.int() })
      .nullable()
      .meta({
        description: 'The first wheel that differs or stands between, lowest first.',
      }),
  })
  .meta({ id: 'Compared' });
