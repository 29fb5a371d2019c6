import { z } from 'zod';
import { paths } from '@/lib/paths';
import { checkedFileSchema } from './import-shapes';
import { type ApiPaths, BODY_REFUSALS, bodyOf, jsonOf, MEMBER_REFUSALS, refusals } from './openapi-parts';
import {
  appendSchema,
  correctionSchema,
  loggedSchema,
  newRunSchema,
  runChangeSchema,
  runListSchema,
  runQuerySchema,
  runSchema,
  runSummarySchema,
  takeBackSchema,
} from './run-shapes';

const runId = z.object({ id: z.uuid().meta({ description: 'Id of the run.' }) });
const stepId = runId.extend({ seq: z.int().meta({ description: 'Number of the step.' }) });
const tags = ['Runs'];
const ofRun = { tags, requestParams: { path: runId } };

/** A body or an answer that is a file. */
const fileOf = (type: string): { content: Record<string, { schema: { type: 'string'; format: 'binary' } }> } => ({
  content: { [type]: { schema: { type: 'string', format: 'binary' } } },
});
const fileBody = {
  required: true,
  content: { ...fileOf('text/csv').content, ...fileOf('application/octet-stream').content },
} as const;

const checkQuery = z.object({
  machine: z.uuid().meta({ description: 'Whose layout the file is read on.' }),
  name: z.string().optional().meta({ description: 'Name of the file.' }),
});
const storeQuery = checkQuery.extend({
  sha256: z.string().meta({ description: 'As the check answered it.' }),
  again: z.enum(['true']).optional().meta({ description: 'Store a file that is a run already.' }),
});

const oneRun: ApiPaths = {
  [paths.api.run('{id}')]: {
    get: {
      ...ofRun,
      operationId: 'getRun',
      summary: 'A run with every step',
      responses: { '200': jsonOf(runSchema, 'The run.'), ...refusals(...MEMBER_REFUSALS) },
    },
    patch: {
      ...ofRun,
      operationId: 'changeRun',
      summary: 'Change what a run is called and what is noted about it (tester, builder, lead)',
      requestBody: bodyOf(runChangeSchema),
      responses: {
        '200': jsonOf(runSummarySchema, 'The run as it is now.'),
        ...refusals(...BODY_REFUSALS, ...MEMBER_REFUSALS),
      },
    },
    delete: {
      ...ofRun,
      operationId: 'deleteRun',
      summary: 'Delete a run that has no step at all (tester, builder, lead)',
      responses: { '204': { description: 'It is gone.' }, ...refusals(...MEMBER_REFUSALS, 409) },
    },
  },
  [paths.api.runFinish('{id}')]: {
    post: {
      ...ofRun,
      operationId: 'finishRun',
      summary: 'Finish a run; readings can still be put right (tester, builder, lead)',
      responses: { '200': jsonOf(runSummarySchema, 'The run as it is now.'), ...refusals(...MEMBER_REFUSALS, 409) },
    },
  },
  [paths.api.runCsv('{id}')]: {
    get: {
      operationId: 'exportRun',
      tags,
      summary: 'A run as CSV: the steps that stand, with their readings as they are now',
      requestParams: {
        path: runId,
        query: z.object({
          form: z
            .enum(['exact', 'spreadsheet'])
            .optional()
            .meta({ default: 'exact', description: 'spreadsheet guards notes that would be run as formulas.' }),
        }),
      },
      responses: { '200': { description: 'The file.', ...fileOf('text/csv') }, ...refusals(400, ...MEMBER_REFUSALS) },
    },
  },
  [paths.api.runFile('{id}')]: {
    get: {
      ...ofRun,
      operationId: 'getRunFile',
      summary: 'The file a run was imported from, byte for byte',
      responses: {
        '200': { description: 'The file.', ...fileOf('application/octet-stream') },
        ...refusals(...MEMBER_REFUSALS),
      },
    },
  },
};

const steps: ApiPaths = {
  // A step is addressed by its number; `{seq}` stands where paths.api.runStep puts one.
  [`${paths.api.runSteps('{id}')}/{seq}`]: {
    delete: {
      operationId: 'takeBackStep',
      tags,
      summary: 'Take back the last step that stands; it stays in sight (tester, builder, lead)',
      requestParams: { path: stepId },
      requestBody: bodyOf(takeBackSchema),
      responses: {
        '200': jsonOf(loggedSchema, 'The step, marked.'),
        ...refusals(...BODY_REFUSALS, ...MEMBER_REFUSALS, 409),
      },
    },
  },
  [paths.api.runSteps('{id}')]: {
    post: {
      ...ofRun,
      operationId: 'appendSteps',
      summary: 'Add steps; sent again with the same ids, they are stored once (tester, builder, lead)',
      requestBody: bodyOf(appendSchema),
      responses: {
        '200': jsonOf(loggedSchema, 'The steps as stored.'),
        ...refusals(...BODY_REFUSALS, ...MEMBER_REFUSALS, 409),
      },
    },
  },
  [paths.api.runCorrections('{id}')]: {
    post: {
      ...ofRun,
      operationId: 'correctReading',
      summary: 'Put a reading in place of another, which stays on record, or add one (tester, builder, lead)',
      requestBody: bodyOf(correctionSchema),
      responses: {
        '201': jsonOf(loggedSchema, 'The step with its reading as it stands now.'),
        ...refusals(...BODY_REFUSALS, ...MEMBER_REFUSALS, 409),
      },
    },
  },
};

const imports: ApiPaths = {
  [paths.api.importCheck]: {
    post: {
      operationId: 'checkFile',
      tags,
      summary: 'Read a file of a run and tell everything about it; nothing is stored (tester, builder, lead)',
      requestParams: { query: checkQuery },
      requestBody: fileBody,
      responses: {
        '200': jsonOf(checkedFileSchema, 'The file as it was understood.'),
        ...refusals(413, 415, ...MEMBER_REFUSALS),
      },
    },
  },
  [paths.api.imports]: {
    post: {
      operationId: 'storeFile',
      tags,
      summary: 'Store a checked file as a finished run, all of it or nothing (tester, builder, lead)',
      requestParams: { query: storeQuery },
      requestBody: fileBody,
      responses: {
        '201': jsonOf(runSummarySchema, 'The run.'),
        ...refusals(...BODY_REFUSALS, ...MEMBER_REFUSALS, 409),
      },
    },
  },
};

export const runPaths: ApiPaths = {
  [paths.api.runs]: {
    get: {
      operationId: 'listRuns',
      tags,
      summary: 'Runs of the workshop or of one machine, latest first',
      requestParams: { query: runQuerySchema },
      responses: { '200': jsonOf(runListSchema, 'The runs.'), ...refusals(400, ...MEMBER_REFUSALS) },
    },
    post: {
      operationId: 'startRun',
      tags,
      summary: 'Start a run; the layout and what is excluded are frozen with it (tester, builder, lead)',
      requestBody: bodyOf(newRunSchema),
      responses: { '201': jsonOf(runSchema, 'The run.'), ...refusals(...BODY_REFUSALS, ...MEMBER_REFUSALS) },
    },
  },
  ...oneRun,
  ...steps,
  ...imports,
};
