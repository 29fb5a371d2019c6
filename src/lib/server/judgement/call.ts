import type { APIContext } from 'astro';
import type { z } from 'zod';
import { type AcceptedRun, acceptRun, type RunDescription } from '@/lib/mechanism/accept';
import { acceptLayout, type LayoutDescription } from '@/lib/mechanism/layout';
import { admitted } from '../doors';
import { readJson } from '../http';
import { spend } from './limit';
import { workOf } from './work';

type RunBody = RunDescription & { readonly layout?: LayoutDescription | undefined };

/**
 * What a public call asks for, through the shape, the core's doors and the bounds on work, in this order; paid for
 * before any of it is done.
 */
export async function takeRun<T extends z.ZodType<RunBody>>(
  { request, clientAddress }: Pick<APIContext, 'request' | 'clientAddress'>,
  schema: T,
): Promise<AcceptedRun> {
  await spend(clientAddress, 1);
  const body: RunBody = await readJson(request, schema);
  const layout = admitted(acceptLayout(body.layout ?? {}), ['layout']);
  const run = admitted(acceptRun(layout, body));
  await spend(clientAddress, workOf(run).points);
  return run;
}
