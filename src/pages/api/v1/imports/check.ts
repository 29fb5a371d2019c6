import { requireMember } from '@/lib/server/auth/guard';
import { givenFile } from '@/lib/server/given-file';
import { endpoint, json } from '@/lib/server/http';
import { checkFile } from '@/lib/server/store/run-imports';

/** Reads a file (the body, as it is) for a machine and tells everything about it; stores nothing. */
export const POST = endpoint(async ({ locals, request, url }) => {
  const member = requireMember(locals, 'run:log');
  const file = await givenFile(request, url);
  return json(await member.inside((tx) => checkFile(tx, member, url.searchParams.get('machine') ?? undefined, file)));
});
