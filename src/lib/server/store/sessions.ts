import { and, asc, desc, eq, isNull, lt, ne } from 'drizzle-orm';
import { v7 } from 'uuid';
import type { SignedIn } from '../auth/guard';
import type { Tx } from '../db/client';
import { membership, person, session, workshop } from '../db/schema/people';
import { scoped, widen } from '../db/scope';

/** Days after which a browser must sign in anew, however busy it was. */
export const LONGEST_DAYS = 14;
/** A browser that nobody has used for this long is signed out. */
const IDLE_HOURS = 12;
const HOUR = 60 * 60 * 1000;

interface NewSession {
  readonly personId: string;
  readonly workshopId: string;
  readonly address: string;
  readonly agent: string | null;
}

/** Adds a session row in the scope of its person; answers with its id. */
export async function openSession(tx: Tx, made: NewSession): Promise<string> {
  const id = v7();
  const expiresAt = new Date(Date.now() + LONGEST_DAYS * 24 * HOUR);
  // The person's ended sessions go with this one, so that the table does not grow for ever.
  await tx.delete(session).where(and(eq(session.personId, made.personId), lt(session.expiresAt, new Date())));
  await tx.insert(session).values({ id, ...made, expiresAt });
  return id;
}

export async function closeSession(tx: Tx, id: string): Promise<void> {
  await tx.delete(session).where(eq(session.id, id));
}

/** Ends every session of the person but one; null ends all. */
export async function closeOtherSessions(tx: Tx, personId: string, kept: string | null): Promise<void> {
  await tx.delete(session).where(and(eq(session.personId, personId), kept ? ne(session.id, kept) : undefined));
}

export interface SessionShown {
  readonly id: string;
  readonly createdAt: Date;
  readonly seenAt: Date;
  /** Network address it signed in from. */
  readonly address: string | null;
}

export function listSessions(tx: Tx, personId: string): Promise<SessionShown[]> {
  return tx
    .select({ id: session.id, createdAt: session.createdAt, seenAt: session.seenAt, address: session.address })
    .from(session)
    .where(eq(session.personId, personId))
    .orderBy(desc(session.seenAt));
}

export async function standIn(tx: Tx, sessionId: string, workshopId: string): Promise<void> {
  await tx.update(session).set({ workshopId }).where(eq(session.id, sessionId));
}

/** Workshops the person belongs to, with the role there, by name. */
export function workshopsOf(tx: Tx, personId: string) {
  return tx
    .select({ id: workshop.id, name: workshop.name, zone: workshop.zone, role: membership.role })
    .from(membership)
    .innerJoin(workshop, eq(workshop.id, membership.workshopId))
    .where(and(eq(membership.personId, personId), isNull(membership.endedAt)))
    .orderBy(asc(workshop.name));
}

/**
 * Who stands behind a session row at this moment: role and membership are read anew for every request, so that losing
 * one acts at the next. Null when the row is gone, too old, idle for too long, or its person belongs to no workshop.
 */
export function readSession(sessionId: string): Promise<SignedIn | null> {
  return scoped({ session: sessionId }, async (tx) => {
    const [row] = await tx.select().from(session).where(eq(session.id, sessionId));
    const now = Date.now();
    if (!row) return null;
    if (row.expiresAt.getTime() <= now || row.seenAt.getTime() + IDLE_HOURS * HOUR <= now) {
      await closeSession(tx, sessionId);
      return null;
    }
    await widen(tx, { person: row.personId });
    const [who] = await tx.select().from(person).where(eq(person.id, row.personId));
    const workshops = await workshopsOf(tx, row.personId);
    const standing = workshops.find(({ id }) => id === row.workshopId) ?? workshops[0];
    if (!who || !standing) return null;
    // Once a minute is enough for "last seen", and spares a write on every request.
    if (row.seenAt.getTime() + 60_000 < now)
      await tx
        .update(session)
        .set({ seenAt: new Date(now), workshopId: standing.id })
        .where(eq(session.id, sessionId));
    return {
      sessionId,
      person: { id: who.id, name: who.name, email: who.email },
      workshop: { id: standing.id, name: standing.name, zone: standing.zone },
      role: standing.role,
      workshops: workshops.map(({ id, name }) => ({ id, name })),
    };
  });
}
