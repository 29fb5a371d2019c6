import { z } from 'zod';
import { MOST_FAULTS } from '@/lib/mechanism/accept-faults';
import { FAULT_KINDS, type FaultKind } from '@/lib/mechanism/faults';
import { REGISTERS } from '@/lib/mechanism/steps';
import { oneOf, wholeNumber } from './layout';

const RATE = 'Give a number from 0 to 1.';
const rate = z.number({ error: RATE }).min(0, { error: RATE }).max(1, { error: RATE }).optional().meta({
  default: 1,
  description: 'Chance that the fault acts each time it could.',
});

const place = wholeNumber(1, 32);
const BY = 'Give 1 or -1.';
const by = z.literal([1, -1], { error: BY });

const atWheel = <const K extends FaultKind>(kind: K) => z.strictObject({ kind: z.literal(kind), wheel: place, rate });
const anywhere = <const K extends FaultKind>(kind: K) => z.strictObject({ kind: z.literal(kind), rate });

/** One physical cause at one place. Whether the layout has the place is for the core's door to say. */
export const faultSchema = z
  .discriminatedUnion(
    'kind',
    [
      atWheel('carry-missed'),
      atWheel('carry-held'),
      atWheel('wheel-short'),
      atWheel('wheel-over'),
      atWheel('wheel-seized'),
      z.strictObject({ kind: z.literal('slide-off'), slide: place, by, rate }),
      z.strictObject({
        kind: z.literal('slide-stuck'),
        slide: place,
        at: wholeNumber(0, 9),
        rate,
      }),
      z.strictObject({
        kind: z.literal('tooth-short'),
        tooth: wholeNumber(1, 9),
        drum: oneOf(['add', 'subtract']),
        rate,
      }),
      z.strictObject({
        kind: z.literal('clear-missed'),
        register: oneOf(REGISTERS),
        wheel: place,
        rate,
      }),
      atWheel('counter-missed'),
      atWheel('counter-carry-missed'),
      anywhere('reverse-dead'),
      anywhere('counter-inverted'),
      z.strictObject({
        kind: z.literal('carriage-off'),
        position: place,
        by,
        rate,
      }),
    ],
    {
      error: `Give an object whose "kind" is one of ${FAULT_KINDS.join(', ')}.`,
    },
  )
  .meta({ id: 'Fault', description: 'One physical cause at one place.' });

export const faultsSchema = z.array(faultSchema, { error: 'Give a list of faults.' }).max(MOST_FAULTS, {
  error: `At most ${MOST_FAULTS} faults are taken in one call.`,
});
