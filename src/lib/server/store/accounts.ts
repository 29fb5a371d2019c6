import { and, eq, isNull } from 'drizzle-orm';
import { v7 } from 'uuid';
import { hashPassword, passwordFits } from '../auth/password';
import type { Tx } from '../db/client';
import { credential, membership, person, workshop } from '../db/schema/people';
import { scoped, widen } from '../db/scope';
import { uniqueViolation } from '../db/violations';

export interface Account {
  readonly personId: string;
  readonly hash: string;
}

/** The account of an e-mail address, in a transaction whose scope is widened to that address and person. */
export async function accountOf(tx: Tx, email: string): Promise<Account | null> {
  await widen(tx, { email });
  const [who] = await tx.select({ id: person.id }).from(person).where(eq(person.email, email));
  if (!who) return null;
  await widen(tx, { person: who.id });
  const [kept] = await tx.select().from(credential).where(eq(credential.personId, who.id));
  return kept ? { personId: who.id, hash: kept.passwordHash } : null;
}

/**
 * The person whose e-mail and password these are, or null. An unknown address takes as long as a wrong password.
 */
export async function whoSignsIn(email: string, password: string): Promise<string | null> {
  const account = await scoped({}, (tx) => accountOf(tx, email));
  return (await passwordFits(account?.hash, password)) && account ? account.personId : null;
}

/** First workshop of a person, where a new session stands; null when they belong to none. */
export function firstWorkshop(personId: string): Promise<string | null> {
  return scoped({ person: personId }, async (tx) => {
    const [row] = await tx
      .select({ id: membership.workshopId })
      .from(membership)
      .where(and(eq(membership.personId, personId), isNull(membership.endedAt)))
      .orderBy(membership.createdAt)
      .limit(1);
    return row?.id ?? null;
  });
}

/** Adds a person with a password inside a transaction; its scope is widened to them. */
export async function addPerson(tx: Tx, email: string, name: string, passwordHash: string): Promise<string> {
  const personId = v7();
  await widen(tx, { person: personId });
  await tx.insert(person).values({ id: personId, email, name });
  await tx.insert(credential).values({ personId, passwordHash });
  return personId;
}

export interface NewWorkshop {
  readonly workshop: string;
  readonly zone: string;
  readonly name: string;
  readonly email: string;
  readonly password: string;
}

/** Thrown inside the transaction to leave it unmade. */
class WrongPassword extends Error {}

/**
 * Makes a workshop with its first lead. An e-mail that has an account already must come with that account's password;
 * then the workshop is added to it. Null when it does not fit.
 */
export async function foundWorkshop(made: NewWorkshop): Promise<{ personId: string; workshopId: string } | null> {
  const passwordHash = await hashPassword(made.password);
  const attempt = (): Promise<{ personId: string; workshopId: string }> =>
    scoped({}, async (tx) => {
      const account = await accountOf(tx, made.email);
      if (account && !(await passwordFits(account.hash, made.password))) throw new WrongPassword();
      const personId = account?.personId ?? (await addPerson(tx, made.email, made.name, passwordHash));
      const workshopId = v7();
      await widen(tx, { workshop: workshopId });
      await tx.insert(workshop).values({ id: workshopId, name: made.workshop, zone: made.zone });
      await tx.insert(membership).values({ workshopId, personId, role: 'lead' });
      return { personId, workshopId };
    });
  try {
    return await attempt();
  } catch (error) {
    if (error instanceof WrongPassword) return null;
    // Somebody took the address between looking and adding: then it is an account like any other.
    if (uniqueViolation(error) === 'person_email') return attempt().catch(() => null);
    throw error;
  }
}

export async function changePassword(tx: Tx, personId: string, password: string): Promise<void> {
  const passwordHash = await hashPassword(password);
  await tx.update(credential).set({ passwordHash, changedAt: new Date() }).where(eq(credential.personId, personId));
}

export async function rename(tx: Tx, personId: string, name: string): Promise<void> {
  await tx.update(person).set({ name }).where(eq(person.id, personId));
}
