import { takeBackSchema } from '@/lib/schemas/run-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json, notFound, readJson } from '@/lib/server/http';
import { takeBack } from '@/lib/server/store/run-log';

/** Takes the last standing step back, with a reason; it stays in sight. */
export const DELETE = endpoint(async ({ locals, params, request }) => {
  const member = requireMember(locals, 'run:log');
  const { reason } = await readJson(request, takeBackSchema);
  if (!/^[1-9]\d{0,8}$/u.test(params.seq ?? '')) throw notFound();
  return json(await member.inside((tx) => takeBack(tx, member, params.id, Number(params.seq), reason)));
});
