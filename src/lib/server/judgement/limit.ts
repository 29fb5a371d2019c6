import { createHmac } from 'node:crypto';
import { RateLimiterDrizzle, RateLimiterMemory, RateLimiterRes } from 'rate-limiter-flexible';
import { LIMITS } from '@/lib/schemas/limits';
import { database, schema } from '../db/client';
import { Refusal } from '../http';
import { settings } from '../settings';

const WINDOW = { points: LIMITS.callPoints, duration: 60, keyPrefix: 'public' };

let limiter: RateLimiterDrizzle | undefined;

/** Counted in the database, so that several servers share the count; in memory while there is none. */
function calls(): RateLimiterDrizzle {
  limiter ??= new RateLimiterDrizzle({
    ...WINDOW,
    storeClient: database(),
    schema: schema.rateLimit,
    inMemoryBlockOnConsumed: LIMITS.callPoints + 1,
    insuranceLimiter: new RateLimiterMemory(WINDOW),
  });
  return limiter;
}

/** Addresses are counted by a keyed hash: none stands in the table. */
function keyOf(address: string): string {
  return createHmac('sha256', settings().authSecret).update(`public ${address}`).digest('base64url');
}

/** Takes points from what an address may spend in a minute; 429 with `Retry-After` when they are spent. */
export async function spend(address: string, points: number): Promise<void> {
  if (points < 1) return;
  try {
    await calls().consume(keyOf(address), points);
  } catch (spent) {
    if (!(spent instanceof RateLimiterRes)) throw spent;
    const seconds = Math.max(1, Math.ceil(spent.msBeforeNext / 1000));
    throw new Refusal(429, {
      detail: `This address has made as many calls as it may in a minute. Try again in ${seconds} s; long runs cost more than short ones.`,
      headers: { 'retry-after': String(seconds) },
    });
  }
}
