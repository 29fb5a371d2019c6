import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json } from '@/lib/server/http';
import { listPeople } from '@/lib/server/store/people';

export const GET = endpoint(async ({ locals }) => {
  const member = requireMember(locals, 'workshop:read');
  return json({ people: await member.inside((tx) => listPeople(tx, member)) });
});
