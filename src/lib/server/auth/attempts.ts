import { createHmac } from 'node:crypto';
import { RateLimiterDrizzle, RateLimiterRes } from 'rate-limiter-flexible';
import { database, schema } from '../db/client';
import { Refusal } from '../http';
import { settings } from '../settings';

/** Counted failures. NIST SP 800-63B-4 section 3.2.2 allows 100 in a row; these stay far below. */
const RULES = {
  /** Five wrong passwords for one account in a quarter of an hour. */
  account: { points: 5, duration: 15 * 60 },
  /** Thirty from one address, over all accounts. */
  address: { points: 30, duration: 15 * 60 },
  /** Workshops made from one address in an hour. */
  signUp: { points: 20, duration: 60 * 60 },
} as const;
type Rule = keyof typeof RULES;

const limiters = new Map<Rule, RateLimiterDrizzle>();

function limiter(rule: Rule): RateLimiterDrizzle {
  const known = limiters.get(rule);
  if (known) return known;
  const made = new RateLimiterDrizzle({
    storeClient: database(),
    schema: schema.rateLimit,
    keyPrefix: rule,
    ...RULES[rule],
  });
  limiters.set(rule, made);
  return made;
}

/** Keys are hashed: the table of attempts must not be a list of e-mail addresses. */
const keyOf = (value: string): string => createHmac('sha256', settings().authSecret).update(value).digest('base64url');

function tooMany(milliseconds: number): Refusal {
  const seconds = Math.max(1, Math.ceil(milliseconds / 1000));
  return new Refusal(429, {
    detail: `Too many attempts. Try again in ${Math.max(1, Math.ceil(seconds / 60))} minutes.`,
    headers: { 'retry-after': String(seconds) },
  });
}

async function spend(rule: Rule, value: string): Promise<void> {
  try {
    await limiter(rule).consume(keyOf(value));
  } catch (spent) {
    if (spent instanceof RateLimiterRes) throw tooMany(spent.msBeforeNext);
    throw spent;
  }
}

/**
 * Counts an attempt before the password is looked at, so that a hundred at once are a hundred. Returns what to call
 * when it was right: an owner's own slips are then forgotten.
 */
export async function countSignIn(email: string, address: string): Promise<() => Promise<void>> {
  await spend('address', address);
  await spend('account', email);
  return async () => {
    await limiter('account').delete(keyOf(email));
    await limiter('address').reward(keyOf(address));
  };
}

export function countSignUp(address: string): Promise<void> {
  return spend('signUp', address);
}
