import { runChangeSchema } from '@/lib/schemas/run-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json, readJson } from '@/lib/server/http';
import { deleteRun, editRun } from '@/lib/server/store/run-log';
import { getRun, runSummary } from '@/lib/server/store/runs';

export const GET = endpoint(async ({ locals, params }) => {
  const member = requireMember(locals, 'workshop:read');
  return json(await member.inside((tx) => getRun(tx, member, params.id)));
});

export const PATCH = endpoint(async ({ locals, params, request }) => {
  const member = requireMember(locals, 'run:log');
  const change = await readJson(request, runChangeSchema);
  const run = await member.inside(async (tx) => {
    await editRun(tx, member, params.id, change);
    return runSummary(tx, member, params.id);
  });
  return json(run);
});

/** Only while it has no step at all. */
export const DELETE = endpoint(async ({ locals, params }) => {
  const member = requireMember(locals, 'run:delete-empty');
  await member.inside((tx) => deleteRun(tx, member, params.id));
  return new Response(null, { status: 204 });
});
