import { appendSchema } from '@/lib/schemas/run-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json, readJson } from '@/lib/server/http';
import { appendSteps } from '@/lib/server/store/run-log';

/** Adds steps. Each carries an id of the sender's own, so that sending again stores once. */
export const POST = endpoint(async ({ locals, params, request }) => {
  const member = requireMember(locals, 'run:log');
  const sent = await readJson(request, appendSchema);
  return json(await member.inside((tx) => appendSteps(tx, member, params.id, sent)));
});
