import { attachment } from '@/lib/server/attachment';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint } from '@/lib/server/http';
import { originalFile } from '@/lib/server/store/run-imports';

/** The file a run was imported from, byte for byte. */
export const GET = endpoint(async ({ locals, params }) => {
  const member = requireMember(locals, 'workshop:read');
  const { name, bytes } = await member.inside((tx) => originalFile(tx, member, params.id));
  return attachment(bytes, name, 'application/octet-stream');
});
