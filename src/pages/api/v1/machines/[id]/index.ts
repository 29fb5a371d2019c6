import { machineChangeSchema } from '@/lib/schemas/machine-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json, readJson, refuseInput } from '@/lib/server/http';
import { updateMachine } from '@/lib/server/store/machine-changes';
import { getMachine, versionTag } from '@/lib/server/store/machines';

export const GET = endpoint(async ({ locals, params }) => {
  const member = requireMember(locals, 'workshop:read');
  const machine = await member.inside((tx) => getMachine(tx, member, params.id));
  return json(machine, 200, { etag: versionTag(machine) });
});

/** The version that the caller saw, from `If-Match` or else from the body. */
function seenVersion(request: Request, inBody: number | undefined): number {
  const tag = request.headers.get('if-match');
  if (tag === null && inBody !== undefined) return inBody;
  const version = /^"(\d{1,9})"$/u.exec(tag ?? '')?.[1];
  if (version !== undefined && (inBody === undefined || inBody === Number(version))) return Number(version);
  const detail =
    tag === null
      ? 'Say which version of the machine you saw, here or as If-Match: "version", so that no other change is lost.'
      : 'If-Match holds one version in quotes, as ETag gave it, and the same as the body if that names one too.';
  return refuseInput([{ pointer: '/version', detail }]);
}

export const PATCH = endpoint(async ({ locals, params, request }) => {
  const member = requireMember(locals, 'machine:manage');
  const { version, ...change } = await readJson(request, machineChangeSchema);
  const machine = await member.inside(async (tx) => {
    // What is not there is answered before what is wrong with the change.
    await getMachine(tx, member, params.id);
    await updateMachine(tx, member, params.id, seenVersion(request, version), change);
    return getMachine(tx, member, params.id);
  });
  return json(machine, 200, { etag: versionTag(machine) });
});
