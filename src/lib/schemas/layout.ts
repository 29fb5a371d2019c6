import { z } from 'zod';
import { LAYOUT_COUNTS, type Layout, SUBTRACTIONS } from '@/lib/mechanism/layout';

/** A whole number within a range, refused in one sentence whatever is wrong with it. */
export function wholeNumber(from: number, to: number): z.ZodInt {
  const error = `Give a whole number from ${from} to ${to}.`;
  return z.int({ error }).min(from, { error }).max(to, { error });
}

/** One of a closed set, refused with the set. */
export function oneOf<const T extends readonly string[]>(values: T): z.ZodEnum<{ [K in T[number]]: K }> {
  return z.enum(values, { error: `Give one of ${values.join(', ')}.` });
}

/** True or false, refused in words. */
export const truth = z.boolean({ error: 'Give true or false.' });

const counted = (field: keyof typeof LAYOUT_COUNTS): z.ZodInt =>
  wholeNumber(LAYOUT_COUNTS[field].from, LAYOUT_COUNTS[field].to);

/** A machine's layout as the public interface takes it: any field left out takes its usual value. */
export const layoutSchema = z
  .strictObject({
    settingSlides: counted('settingSlides').optional().meta({ default: 8 }),
    resultWheels: counted('resultWheels').optional().meta({ default: 11 }),
    counterWheels: counted('counterWheels').optional().meta({ default: 6 }),
    carriagePositions: counted('carriagePositions').optional().meta({ default: 6 }),
    subtraction: oneOf(SUBTRACTIONS).optional().meta({ default: 'complement' }),
    complementColumns: wholeNumber(1, 32).nullable().optional().meta({
      description: 'Columns that the complement steps reach, from the lowest slide; null = up to the highest wheel.',
    }),
    resultCarry: wholeNumber(0, 32).nullable().optional().meta({
      description: 'Wheels above the lowest driven one that a carry still reaches; null = all.',
    }),
    counterCarry: truth.optional().meta({ default: true }),
  })
  .meta({
    id: 'Layout',
    description: 'Layout of a machine. Fields left out take their usual values.',
  });

/** A layout as the public interface gives it: every field present. */
export const wholeLayoutSchema = z
  .object({
    settingSlides: z.int(),
    resultWheels: z.int(),
    counterWheels: z.int(),
    carriagePositions: z.int(),
    subtraction: z.enum(SUBTRACTIONS),
    complementColumns: z.int().nullable(),
    resultCarry: z.int().nullable(),
    counterCarry: z.boolean(),
  })
  .meta({
    id: 'WholeLayout',
    description: 'Layout of a machine with every field.',
  });

/** A layout's fields without the mark of acceptance: what travels to pages and scripts. */
export type LayoutFields = z.infer<typeof wholeLayoutSchema>;

/** Takes the fields, and nothing else, out of a layout or a row that holds one. */
export function layoutFields(from: Omit<Layout, symbol> | LayoutFields): LayoutFields {
  return {
    settingSlides: from.settingSlides,
    resultWheels: from.resultWheels,
    counterWheels: from.counterWheels,
    carriagePositions: from.carriagePositions,
    subtraction: from.subtraction,
    complementColumns: from.complementColumns,
    resultCarry: from.resultCarry,
    counterCarry: from.counterCarry,
  };
}
