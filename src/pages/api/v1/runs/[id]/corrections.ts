import { correctionSchema } from '@/lib/schemas/run-shapes';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, json, readJson } from '@/lib/server/http';
import { correctReading } from '@/lib/server/store/run-readings';

export const POST = endpoint(async ({ locals, params, request }) => {
  const member = requireMember(locals, 'run:log');
  const sent = await readJson(request, correctionSchema);
  return json(await member.inside((tx) => correctReading(tx, member, params.id, sent)), 201);
});
