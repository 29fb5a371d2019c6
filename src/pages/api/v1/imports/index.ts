import { paths } from '@/lib/paths';
import { requireMember } from '@/lib/server/auth/guard';
import { givenFile } from '@/lib/server/given-file';
import { endpoint, json } from '@/lib/server/http';
import { storeFile } from '@/lib/server/store/run-imports';
import { runSummary } from '@/lib/server/store/runs';

/** Stores a checked file as a run, all or nothing. `sha256` is what the check answered; `again=true` allows a second time. */
export const POST = endpoint(async ({ locals, request, url }) => {
  const member = requireMember(locals, 'run:log');
  const file = await givenFile(request, url);
  const query = url.searchParams;
  const given = { ...file, sha256: query.get('sha256') ?? '', again: query.get('again') === 'true' };
  const run = await member.inside(async (tx) =>
    runSummary(tx, member, await storeFile(tx, member, query.get('machine') ?? undefined, given)),
  );
  return json(run, 201, { location: paths.api.run(run.id) });
});
