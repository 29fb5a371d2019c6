import { z } from 'zod';
import { paths } from '@/lib/paths';
import {
  exclusionEndSchema,
  exclusionSchema,
  machineChangeSchema,
  machineSchema,
  machineSummarySchema,
  newExclusionSchema,
  newMachineSchema,
} from './machine-shapes';
import { type ApiPaths, BODY_REFUSALS, bodyOf, jsonOf, MEMBER_REFUSALS, refusals } from './openapi-parts';

const machineId = z.object({ id: z.uuid().meta({ description: 'Id of the machine.' }) });
const exclusionId = machineId.extend({ exclusion: z.uuid().meta({ description: 'Id of the exclusion.' }) });
const tags = ['Machines'];

export const machinePaths: ApiPaths = {
  [paths.api.machines]: {
    get: {
      operationId: 'listMachines',
      tags,
      summary: 'Machines of the workshop, by name',
      responses: {
        '200': jsonOf(z.object({ machines: z.array(machineSummarySchema) }), 'The machines.'),
        ...refusals(401, 403),
      },
    },
    post: {
      operationId: 'createMachine',
      tags,
      summary: 'Enter a machine (lead)',
      requestBody: bodyOf(newMachineSchema),
      responses: { '201': jsonOf(machineSchema, 'The machine.'), ...refusals(...BODY_REFUSALS, 401, 403, 409) },
    },
  },
  [paths.api.machine('{id}')]: {
    get: {
      operationId: 'getMachine',
      tags,
      summary: 'A machine; its ETag is its version',
      requestParams: { path: machineId },
      responses: { '200': jsonOf(machineSchema, 'The machine.'), ...refusals(...MEMBER_REFUSALS) },
    },
    patch: {
      operationId: 'changeMachine',
      tags,
      summary: 'Change a machine that was seen at a version (lead)',
      requestParams: {
        path: machineId,
        header: z.object({
          'If-Match': z.string().optional().meta({ description: 'The version seen, in quotes, as ETag gave it.' }),
        }),
      },
      requestBody: bodyOf(machineChangeSchema),
      responses: {
        '200': jsonOf(machineSchema, 'The machine as it is now.'),
        ...refusals(...BODY_REFUSALS, ...MEMBER_REFUSALS, 409),
      },
    },
  },
  [paths.api.exclusions('{id}')]: {
    get: {
      operationId: 'listExclusions',
      tags,
      summary: 'Wheels left out of the judgement, open ones first',
      requestParams: { path: machineId },
      responses: {
        '200': jsonOf(z.object({ exclusions: z.array(exclusionSchema) }), 'The exclusions.'),
        ...refusals(...MEMBER_REFUSALS),
      },
    },
    post: {
      operationId: 'addExclusion',
      tags,
      summary: 'Leave a wheel out of the judgement (builder, lead)',
      requestParams: { path: machineId },
      requestBody: bodyOf(newExclusionSchema),
      responses: {
        '201': jsonOf(exclusionSchema, 'The exclusion.'),
        ...refusals(...BODY_REFUSALS, ...MEMBER_REFUSALS, 409),
      },
    },
  },
  [paths.api.exclusion('{id}', '{exclusion}')]: {
    get: {
      operationId: 'getExclusion',
      tags,
      summary: 'An exclusion',
      requestParams: { path: exclusionId },
      responses: { '200': jsonOf(exclusionSchema, 'The exclusion.'), ...refusals(...MEMBER_REFUSALS) },
    },
    patch: {
      operationId: 'endExclusion',
      tags,
      summary: 'End an exclusion (builder, lead)',
      requestParams: { path: exclusionId },
      requestBody: bodyOf(exclusionEndSchema),
      responses: {
        '200': jsonOf(exclusionSchema, 'The exclusion as it is now.'),
        ...refusals(...BODY_REFUSALS, ...MEMBER_REFUSALS, 409),
      },
    },
  },
};
