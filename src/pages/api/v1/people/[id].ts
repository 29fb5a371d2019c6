import { roleChangeSchema } from '@/lib/schemas/people';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, readJson } from '@/lib/server/http';
import { changeRole, removePerson } from '@/lib/server/store/people';

const done = (): Response => new Response(null, { status: 204 });

export const PATCH = endpoint(async ({ locals, params, request }) => {
  const member = requireMember(locals, 'people:manage');
  const { role } = await readJson(request, roleChangeSchema);
  await member.inside((tx) => changeRole(tx, member, params.id, role));
  return done();
});

export const DELETE = endpoint(async ({ locals, params }) => {
  const member = requireMember(locals, 'people:manage');
  await member.inside((tx) => removePerson(tx, member, params.id));
  return done();
});
