import { startApp, type TestApp } from '@tests/helpers/app';
import { beforeAll, describe, expect, it } from 'vitest';

let app: TestApp;
beforeAll(async () => {
  app = await startApp();
});

/** A wrong sign-in to an account of its own, by somebody who says that they come from elsewhere. */
const guess = (to: TestApp, number: number, forwarded: string): Promise<Response> =>
  to.visitor().fetch('/sign-in', {
    method: 'POST',
    headers: { 'x-forwarded-for': forwarded },
    body: new URLSearchParams({ email: `nobody${number}@example.org`, password: 'a guess of many words' }),
  });

async function statuses(to: TestApp, forwarded: (number: number) => string): Promise<Set<number>> {
  const seen = new Set<number>();
  for (let number = 0; number < 32; number += 1) seen.add((await guess(to, number, forwarded(number))).status);
  return seen;
}

describe('the address that attempts are counted by', () => {
  it('is the one that connects: nobody gets a new one by saying so', async () => {
    expect(await statuses(app, (number) => `203.0.113.${number}`)).toEqual(new Set([401, 429]));
  });

  it('is what a trusted proxy says, the last word before it, and not what its caller made up', async () => {
    const behind = await startApp({ TRUSTED_PROXIES: 'loopback' });
    expect(await statuses(behind, (number) => `203.0.113.${number}`)).toEqual(new Set([401]));
    // The proxy adds the true address at the end; what stands before it is the caller's own word.
    expect(await statuses(behind, (number) => `203.0.113.${number}, 198.51.100.7`)).toEqual(new Set([401, 429]));
  });
});
