import { invitationSchema } from '@/lib/schemas/people';
import { requireMember } from '@/lib/server/auth/guard';
import { invitationLink } from '@/lib/server/auth/link';
import { endpoint, json, readJson } from '@/lib/server/http';
import { invite, openInvitations } from '@/lib/server/store/invitations';

export const GET = endpoint(async ({ locals }) => {
  const member = requireMember(locals, 'people:manage');
  return json({ invitations: await member.inside((tx) => openInvitations(tx, member)) });
});

/** Answers with the link, which is shown this once. */
export const POST = endpoint(async ({ locals, request, url }) => {
  const member = requireMember(locals, 'people:manage');
  const made = await readJson(request, invitationSchema);
  const { id, token } = await member.inside((tx) => invite(tx, member, made));
  return json({ id, link: invitationLink(url, token) }, 201);
});
