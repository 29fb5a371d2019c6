import { requireMember } from '@/lib/server/auth/guard';
import { invitationLink } from '@/lib/server/auth/link';
import { endpoint, json } from '@/lib/server/http';
import { renewInvitation, revokeInvitation } from '@/lib/server/store/invitations';

/** A new link for the same person; the old one stops working. */
export const POST = endpoint(async ({ locals, params, url }) => {
  const member = requireMember(locals, 'people:manage');
  const { id, token } = await member.inside((tx) => renewInvitation(tx, member, params.id));
  return json({ id, link: invitationLink(url, token) });
});

export const DELETE = endpoint(async ({ locals, params }) => {
  const member = requireMember(locals, 'people:manage');
  await member.inside((tx) => revokeInvitation(tx, member, params.id));
  return new Response(null, { status: 204 });
});
