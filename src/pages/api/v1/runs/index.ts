import { paths } from '@/lib/paths';
import { newRunSchema } from '@/lib/schemas/run-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json, readJson, refuseInput } from '@/lib/server/http';
import { startRun } from '@/lib/server/store/run-log';
import { getRun, listRuns } from '@/lib/server/store/runs';

/** The latest runs; `machine` chooses one machine's, `before` goes on behind a run's number. */
export const GET = endpoint(async ({ locals, url }) => {
  const member = requireMember(locals, 'workshop:read');
  const before = url.searchParams.get('before');
  if (before !== null && !/^\d{1,9}$/u.test(before))
    refuseInput([{ pointer: '/before', detail: 'Give the number of a run.' }]);
  const machine = url.searchParams.get('machine') ?? undefined;
  const choice = { machine, before: before === null ? undefined : Number(before) };
  const { runs, nextNumber } = await member.inside((tx) => listRuns(tx, member, choice));
  return json({ runs, next: nextNumber });
});

export const POST = endpoint(async ({ locals, request }) => {
  const member = requireMember(locals, 'run:log');
  const made = await readJson(request, newRunSchema);
  const run = await member.inside(async (tx) => getRun(tx, member, await startRun(tx, member, made)));
  return json(run, 201, { location: paths.api.run(run.id) });
});
