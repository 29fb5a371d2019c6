import { createHash, randomBytes } from 'node:crypto';
import { and, asc, eq, isNull } from 'drizzle-orm';
import { v7 } from 'uuid';
import type { Role } from '@/lib/policy';
import type { InvitationShown, NewInvitation } from '@/lib/schemas/people';
import { hashPassword, passwordFits } from '../auth/password';
import type { Tx } from '../db/client';
import { invitation, membership, person, workshop } from '../db/schema/people';
import { scoped, widen } from '../db/scope';
import { notFound, Refusal } from '../http';
import { accountOf, addPerson } from './accounts';
import type { Insider } from './insider';
import { idFrom } from './machine-hold';
import { admit } from './people';

const VALID_DAYS = 7;

/** Only this is kept: who reads the table cannot use a link. */
const hashOf = (token: string): string => createHash('sha256').update(token).digest('base64url');

const inDays = (days: number): Date => new Date(Date.now() + days * 24 * 60 * 60 * 1000);

const open = (workshopId: string) =>
  and(eq(invitation.workshopId, workshopId), isNull(invitation.acceptedAt), isNull(invitation.revokedAt));

/** Links that have not been used or revoked, the oldest first. */
export async function openInvitations(tx: Tx, { workshop: { id } }: Insider): Promise<InvitationShown[]> {
  const rows = await tx.select().from(invitation).where(open(id)).orderBy(asc(invitation.createdAt));
  return rows.map((row) => ({
    id: row.id,
    name: row.name,
    email: row.email,
    role: row.role,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    expired: row.expiresAt.getTime() <= Date.now(),
  }));
}

export interface MadeInvitation {
  readonly id: string;
  /** 256 random bits; shown once and not kept. */
  readonly token: string;
}

/** Makes a one-time link; an open one for the same e-mail is revoked. 409 when they belong to the workshop already. */
export async function invite(tx: Tx, who: Insider, made: NewInvitation): Promise<MadeInvitation> {
  const workshopId = who.workshop.id;
  const [member] = await tx
    .select({ id: person.id })
    .from(membership)
    .innerJoin(person, eq(person.id, membership.personId))
    .where(and(eq(membership.workshopId, workshopId), isNull(membership.endedAt), eq(person.email, made.email)));
  if (member) throw new Refusal(409, { detail: `${made.email} belongs to this workshop already.` });
  await tx
    .update(invitation)
    .set({ revokedAt: new Date() })
    .where(and(open(workshopId), eq(invitation.email, made.email)));
  const id = v7();
  const token = randomBytes(32).toString('base64url');
  await tx.insert(invitation).values({
    workshopId,
    id,
    ...made,
    tokenHash: hashOf(token),
    createdBy: who.person.id,
    expiresAt: inDays(VALID_DAYS),
  });
  return { id, token };
}

/** A new link for the same person and role; the old one stops working. */
export async function renewInvitation(tx: Tx, who: Insider, id: string | undefined): Promise<MadeInvitation> {
  const invitationId = idFrom(id);
  const token = randomBytes(32).toString('base64url');
  const renewed = await tx
    .update(invitation)
    .set({ tokenHash: hashOf(token), expiresAt: inDays(VALID_DAYS) })
    .where(and(open(who.workshop.id), eq(invitation.id, invitationId)))
    .returning({ id: invitation.id });
  if (renewed.length === 0) throw notFound();
  return { id: invitationId, token };
}

export async function revokeInvitation(tx: Tx, who: Insider, id: string | undefined): Promise<void> {
  const revoked = await tx
    .update(invitation)
    .set({ revokedAt: new Date() })
    .where(and(open(who.workshop.id), eq(invitation.id, idFrom(id))))
    .returning({ id: invitation.id });
  if (revoked.length === 0) throw notFound();
}

export const INVITATION_STATES = ['open', 'used', 'expired', 'revoked', 'unknown'] as const;
export type InvitationState = (typeof INVITATION_STATES)[number];

export interface HeldInvitation {
  readonly state: InvitationState;
  readonly workshop: string;
  readonly role: Role;
  readonly name: string;
  readonly email: string;
  /** True where the e-mail has an account already: its own password is asked for. */
  readonly known: boolean;
}

type Row = typeof invitation.$inferSelect;

function stateOf(row: Row): InvitationState {
  if (row.acceptedAt) return 'used';
  if (row.revokedAt) return 'revoked';
  return row.expiresAt.getTime() <= Date.now() ? 'expired' : 'open';
}

async function find(tx: Tx, token: string): Promise<Row | null> {
  await widen(tx, { invitation: hashOf(token) });
  const [row] = await tx
    .select()
    .from(invitation)
    .where(eq(invitation.tokenHash, hashOf(token)));
  if (row) await widen(tx, { workshop: row.workshopId });
  return row ?? null;
}

/** What a link leads to, for its page. */
export function readInvitation(token: string): Promise<HeldInvitation | null> {
  return scoped({}, async (tx) => {
    const row = await find(tx, token);
    if (!row) return null;
    const [where] = await tx.select({ name: workshop.name }).from(workshop).where(eq(workshop.id, row.workshopId));
    const known = (await accountOf(tx, row.email)) !== null;
    const { role, name, email } = row;
    return { state: stateOf(row), workshop: where?.name ?? '', role, name, email, known };
  });
}

export type Acceptance =
  | { readonly ok: true; readonly personId: string; readonly workshopId: string }
  | { readonly ok: false; readonly why: 'gone' | 'wrong-password' };

/** Uses a link up: whoever holds it becomes a member, once. */
export async function acceptInvitation(token: string, given: { name: string; password: string }): Promise<Acceptance> {
  // The slow part first, so that no row is locked meanwhile.
  const passwordHash = await hashPassword(given.password);
  return scoped({}, async (tx): Promise<Acceptance> => {
    const seen = await find(tx, token);
    if (!seen) return { ok: false, why: 'gone' };
    // Held still, so that two browsers with one link come one after the other.
    const [row] = await tx
      .select()
      .from(invitation)
      .where(and(eq(invitation.workshopId, seen.workshopId), eq(invitation.id, seen.id)))
      .for('update');
    if (!row || stateOf(row) !== 'open') return { ok: false, why: 'gone' };
    const account = await accountOf(tx, row.email);
    if (account && !(await passwordFits(account.hash, given.password))) return { ok: false, why: 'wrong-password' };
    const personId = account?.personId ?? (await addPerson(tx, row.email, given.name, passwordHash));
    await admit(tx, row.workshopId, personId, row.role);
    await tx
      .update(invitation)
      .set({ acceptedAt: new Date() })
      .where(and(eq(invitation.workshopId, row.workshopId), eq(invitation.id, row.id)));
    return { ok: true, personId, workshopId: row.workshopId };
  });
}
