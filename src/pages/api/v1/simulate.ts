import { simulateSchema } from '@/lib/schemas/simulate';
import { endpoint } from '@/lib/server/http';
import { takeRun } from '@/lib/server/judgement/call';
import { simulatedParts, streamedJson } from '@/lib/server/judgement/parts';

export const POST = endpoint(async (context) => streamedJson(simulatedParts(await takeRun(context, simulateSchema))));
