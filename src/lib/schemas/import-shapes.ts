import { z } from 'zod';
import { DELIMITERS } from '@/lib/interchange/columns';
import { LINE_ENDS } from '@/lib/interchange/csv-table';
import { momentSchema } from './run-shapes';
import { stepSchema } from './steps';

/** A file as it was understood; nothing is stored. May be stored where it has rows and no problem. */
export const checkedFileSchema = z
  .object({
    name: z.string(),
    sha256: z.string().meta({ description: 'Of the bytes; sent back when storing, so that what was seen is stored.' }),
    dialect: z.object({ delimiter: z.enum(DELIMITERS), newline: z.enum(LINE_ENDS), bom: z.boolean() }),
    remarks: z.array(z.string()).meta({ description: 'On the file as a whole.' }),
    rows: z.array(
      z.object({
        line: z.int(),
        understood: z.string().meta({ description: 'The step in plain words.' }),
        step: stepSchema,
        note: z.string(),
        at: momentSchema.nullable(),
        remarks: z.array(z.string()),
      }),
    ),
    problems: z.array(
      z.object({
        line: z.int().nullable().meta({ description: 'null = the file as a whole.' }),
        column: z.string().nullable().meta({ description: 'null = the whole line.' }),
        what: z.string(),
        cure: z.string(),
      }),
    ),
    already: z
      .object({ runId: z.uuid(), number: z.int(), machine: z.string() })
      .nullable()
      .meta({ description: 'The latest run that came from the very same bytes; storing again must say again=true.' }),
  })
  .meta({ id: 'CheckedFile', description: 'A file of a run as it was understood.' });
export type CheckedFile = z.infer<typeof checkedFileSchema>;
