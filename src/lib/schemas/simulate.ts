import { z } from 'zod';
import { faultsSchema } from './faults';
import { layoutSchema } from './layout';
import { startSchema, stepsSchema } from './steps';

/** What `POST /api/v1/simulate` takes. */
export const simulateSchema = z
  .strictObject(
    {
      layout: layoutSchema.optional(),
      start: startSchema.optional(),
      faults: faultsSchema.optional(),
      steps: stepsSchema,
      seed: z.int({ error: 'Give a whole number.' }).optional().meta({
        description: 'Needed when a fault has a rate below 1; the same seed gives the same run.',
      }),
    },
    { error: 'Give an object.' },
  )
  .meta({
    id: 'Simulation',
    description: 'A machine, with faults if any, and what is done to it.',
  });
export type SimulateBody = z.infer<typeof simulateSchema>;

/** How the machine stands after a step. */
export const machineStateAfterSchema = z
  .object({
    result: z.string(),
    counter: z.string(),
    slides: z.string(),
    carriage: z.int(),
    reversed: z.boolean(),
    overflow: z.boolean().meta({
      description: 'Whether any turn of the step carried out of the highest wheel.',
    }),
    carries: z.array(z.int()).meta({
      description: "Result wheels that received a carry in the step's last turn, rising.",
    }),
  })
  .meta({
    id: 'State',
    description: 'How the machine stands after a step. Registers are written highest wheel first.',
  });

/** What `POST /api/v1/simulate` answers. */
export const simulatedSchema = z
  .object({
    states: z.array(machineStateAfterSchema).meta({ description: 'One a step.' }),
  })
  .meta({ id: 'Simulated' });
