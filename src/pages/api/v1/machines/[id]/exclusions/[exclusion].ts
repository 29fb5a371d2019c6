import { exclusionEndSchema } from '@/lib/schemas/machine-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json, notFound, readJson } from '@/lib/server/http';
import { endExclusion } from '@/lib/server/store/exclusions';
import { getMachine } from '@/lib/server/store/machines';

export const GET = endpoint(async ({ locals, params }) => {
  const member = requireMember(locals, 'workshop:read');
  const { exclusions } = await member.inside((tx) => getMachine(tx, member, params.id));
  const found = exclusions.find(({ id }) => id === params.exclusion);
  if (!found) throw notFound();
  return json(found);
});

/** Ends an exclusion; there is nothing else about it that may change. */
export const PATCH = endpoint(async ({ locals, params, request }) => {
  const member = requireMember(locals, 'exclusion:change');
  await readJson(request, exclusionEndSchema);
  const ended = await member.inside(async (tx) => {
    await endExclusion(tx, member, params.id, params.exclusion);
    const { exclusions } = await getMachine(tx, member, params.id);
    return exclusions.find(({ id }) => id === params.exclusion);
  });
  return json(ended);
});
