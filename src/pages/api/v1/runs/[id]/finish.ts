import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json } from '@/lib/server/http';
import { finishRun } from '@/lib/server/store/run-log';
import { runSummary } from '@/lib/server/store/runs';

export const POST = endpoint(async ({ locals, params }) => {
  const member = requireMember(locals, 'run:log');
  const run = await member.inside(async (tx) => {
    await finishRun(tx, member, params.id);
    return runSummary(tx, member, params.id);
  });
  return json(run);
});
