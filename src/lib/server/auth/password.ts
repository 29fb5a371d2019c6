import { hash, verify } from '@node-rs/argon2';
import { LIMITS } from '@/lib/schemas/limits';
import { guessable } from './blocklist';

/** Argon2id, 19 MiB, 2 passes, 1 lane: the floor of the OWASP Password Storage cheat sheet. 2 = Argon2id. */
const COST = { algorithm: 2, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

/** One form for the same characters, whatever keyboard made them (NIST SP 800-63B-4 names NFKC or NFKD). */
const normal = (password: string): string => password.normalize('NFKC');

export function hashPassword(password: string): Promise<string> {
  return hash(normal(password), COST);
}

/** A hash that no password fits, so that an unknown account takes as long as a wrong password. */
let nobody: Promise<string> | undefined;

/** Whether the password fits; with no hash it works as long and answers false. */
export async function passwordFits(stored: string | undefined, password: string): Promise<boolean> {
  nobody ??= hash(crypto.randomUUID(), COST);
  const fits = await verify(stored ?? (await nobody), normal(password));
  return stored !== undefined && fits;
}

/** What is wrong with a new password, in words, or null. Every code point counts one; no rules of composition. */
export function passwordTrouble(password: string, context: readonly string[] = []): string | null {
  const length = [...normal(password)].length;
  if (length < LIMITS.passwordFrom)
    return `At least ${LIMITS.passwordFrom} characters; this has ${length}. A few words in a row are easy to keep.`;
  if (length > LIMITS.passwordTo) return `At most ${LIMITS.passwordTo} characters.`;
  const why = guessable(password, [...context, 'nineover']);
  return why === null ? null : `Too easy to guess. ${why} Choose another.`;
}
