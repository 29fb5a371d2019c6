import { z } from 'zod';
import { paths } from '@/lib/paths';
import { comparedSchema, compareSchema } from './compare';
import { LIMITS } from './limits';
import { type ApiPaths, BODY_REFUSALS, bodyOf, jsonOf, refusals } from './openapi-parts';
import { simulatedSchema, simulateSchema } from './simulate';

const count = (value: number): string => value.toLocaleString('en-GB');

const BOUNDS =
  `Open to everybody. At most ${count(LIMITS.callSteps)} steps and ${count(LIMITS.callBytes)} bytes a call. Each address ` +
  `may spend ${count(LIMITS.callPoints)} points a minute; a call costs one, and one more for every ` +
  `${count(LIMITS.callPointSteps)} steps.`;

const FAULT_BOUNDS =
  ` With faults, a call makes at most ${count(LIMITS.callTurns)} turns in all and costs a point more for every ` +
  `${count(LIMITS.callPointTurns)}; with faults that act only sometimes, ${count(LIMITS.callChanceTurns)} turns, ` +
  `turns times faults at most ${count(LIMITS.callDraws)}, and a point more for every ${count(LIMITS.callPointChanceTurns)}.`;

export const judgementPaths: ApiPaths = {
  [paths.api.simulate]: {
    post: {
      operationId: 'simulate',
      tags: ['Judgement'],
      summary: 'How a machine stands after every step',
      description: BOUNDS + FAULT_BOUNDS,
      security: [],
      requestBody: bodyOf(simulateSchema),
      responses: { '200': jsonOf(simulatedSchema, 'One state a step.'), ...refusals(...BODY_REFUSALS, 429) },
    },
  },
  [paths.api.compare]: {
    post: {
      operationId: 'compare',
      tags: ['Judgement'],
      summary: 'Readings judged wheel by wheel against a healthy machine',
      description: BOUNDS,
      security: [],
      requestBody: bodyOf(compareSchema),
      responses: { '200': jsonOf(comparedSchema, 'Every reading judged.'), ...refusals(...BODY_REFUSALS, 429) },
    },
  },
};

const healthSchema = z
  .object({ status: z.enum(['ok', 'failing']), database: z.enum(['ok', 'failing']) })
  .meta({ id: 'Health' });

export const healthPaths: ApiPaths = {
  [paths.api.health]: {
    get: {
      operationId: 'health',
      tags: ['Service'],
      summary: 'Whether the service works',
      security: [],
      responses: {
        '200': jsonOf(healthSchema, 'It works.'),
        '503': jsonOf(healthSchema, 'It does not.'),
      },
    },
  },
};
