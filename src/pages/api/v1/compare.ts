import { compareSchema } from '@/lib/schemas/compare';
import { endpoint } from '@/lib/server/http';
import { takeRun } from '@/lib/server/judgement/call';
import { comparedParts, streamedJson } from '@/lib/server/judgement/parts';

export const POST = endpoint(async (context) => streamedJson(comparedParts(await takeRun(context, compareSchema))));
