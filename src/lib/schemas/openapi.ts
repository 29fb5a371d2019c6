import { createDocument } from 'zod-openapi';
import { healthPaths, judgementPaths } from './openapi-judgement';
import { machinePaths } from './openapi-machines';
import type { ApiPaths } from './openapi-parts';
import { runPaths } from './openapi-runs';

/** The paths of every feature; a new one adds its own list here. */
const FEATURES: readonly ApiPaths[] = [judgementPaths, machinePaths, runPaths, healthPaths];

/** The OpenAPI 3.1 document, made from the schemas that the routes check with. */
export function openApiDocument(): ReturnType<typeof createDocument> {
  return createDocument({
    openapi: '3.1.0',
    info: {
      title: 'Nineover',
      version: '1',
      description:
        'Functional tests of hand-cranked arithmetic mechanisms. Registers are text, highest wheel first; wheels, slides ' +
        'and positions count from 1 = units. Fields that are not known are refused.',
    },
    tags: [
      { name: 'Judgement', description: 'Without an account.' },
      { name: 'Machines', description: 'Machines, their layouts and the positions left out of the judgement.' },
      { name: 'Runs', description: 'Runs, their steps and readings, and files of runs in and out.' },
      { name: 'Service' },
    ],
    security: [{ session: [] }],
    paths: Object.assign({}, ...FEATURES),
    components: {
      securitySchemes: {
        session: {
          type: 'apiKey',
          in: 'cookie',
          name: 'authjs.session-token',
          description: 'The cookie of a signed-in person.',
        },
      },
    },
  });
}
