import { paths } from '@/lib/paths';
import { newMachineSchema } from '@/lib/schemas/machine-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json, readJson } from '@/lib/server/http';
import { createMachine } from '@/lib/server/store/machine-changes';
import { getMachine, listMachines, versionTag } from '@/lib/server/store/machines';

export const GET = endpoint(async ({ locals }) => {
  const member = requireMember(locals, 'workshop:read');
  return json({ machines: await member.inside((tx) => listMachines(tx, member)) });
});

export const POST = endpoint(async ({ locals, request }) => {
  const member = requireMember(locals, 'machine:manage');
  const entered = await readJson(request, newMachineSchema);
  const made = await member.inside(async (tx) => getMachine(tx, member, await createMachine(tx, member, entered)));
  return json(made, 201, { location: paths.api.machine(made.id), etag: versionTag(made) });
});
