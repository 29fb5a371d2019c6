import { paths } from '@/lib/paths';
import { newExclusionSchema } from '@/lib/schemas/machine-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json, readJson } from '@/lib/server/http';
import { addExclusion } from '@/lib/server/store/exclusions';
import { getMachine } from '@/lib/server/store/machines';
import { todayIn } from '@/lib/server/store/today';

export const GET = endpoint(async ({ locals, params }) => {
  const member = requireMember(locals, 'workshop:read');
  const { exclusions } = await member.inside((tx) => getMachine(tx, member, params.id));
  return json({ exclusions });
});

export const POST = endpoint(async ({ locals, params, request }) => {
  const member = requireMember(locals, 'exclusion:change');
  const added = await readJson(request, newExclusionSchema);
  const today = todayIn(member.workshop.zone);
  const made = await member.inside(async (tx) => {
    const id = await addExclusion(tx, member, params.id, added, today);
    const { exclusions } = await getMachine(tx, member, params.id);
    return exclusions.find((one) => one.id === id);
  });
  if (!made) throw new Error('An exclusion was added and is not there.');
  return json(made, 201, { location: paths.api.exclusion(params.id ?? '', made.id) });
});
