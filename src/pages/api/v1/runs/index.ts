import { paths } from '@/lib/paths';
import { newRunSchema, runQuerySchema } from '@/lib/schemas/run-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { badInputs, endpoint, json, readJson, refuseInput } from '@/lib/server/http';
import { startRun } from '@/lib/server/store/run-log';
import { getRun, listRuns } from '@/lib/server/store/runs';

/** The latest runs; `machine` chooses one machine's, `before` goes on with the `next` of the answer before. */
export const GET = endpoint(async ({ locals, url }) => {
  const member = requireMember(locals, 'workshop:read');
  const query = runQuerySchema.safeParse(Object.fromEntries(url.searchParams));
  if (!query.success) refuseInput(query.error.issues.flatMap(badInputs));
  return json(await member.inside((tx) => listRuns(tx, member, query.data)));
});

export const POST = endpoint(async ({ locals, request }) => {
  const member = requireMember(locals, 'run:log');
  const made = await readJson(request, newRunSchema);
  const run = await member.inside(async (tx) => getRun(tx, member, await startRun(tx, member, made)));
  return json(run, 201, { location: paths.api.run(run.id) });
});
