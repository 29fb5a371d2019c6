import { and, asc, eq, isNull } from 'drizzle-orm';
import type { Role } from '@/lib/policy';
import type { PersonShown } from '@/lib/schemas/people';
import type { Tx } from '../db/client';
import { membership, person, workshop } from '../db/schema/people';
import { notFound, Refusal } from '../http';
import type { Insider } from './insider';
import { idFrom } from './machine-hold';

const standing = (workshopId: string) => and(eq(membership.workshopId, workshopId), isNull(membership.endedAt));

/** Everybody who belongs to the workshop now, by name. */
export async function listPeople(tx: Tx, { workshop: { id } }: Insider): Promise<PersonShown[]> {
  const rows = await tx
    .select({
      id: person.id,
      name: person.name,
      email: person.email,
      role: membership.role,
      since: membership.createdAt,
    })
    .from(membership)
    .innerJoin(person, eq(person.id, membership.personId))
    .where(standing(id))
    .orderBy(asc(person.name));
  return rows.map((row) => ({ ...row, since: row.since.toISOString() }));
}

/**
 * Roles of the workshop, held still: two leads who demote each other at the same moment come one after the other, and
 * the second finds itself the last.
 */
async function holdRoles(tx: Tx, workshopId: string): Promise<Map<string, Role>> {
  await tx.select({ id: workshop.id }).from(workshop).where(eq(workshop.id, workshopId)).for('update');
  const rows = await tx
    .select({ id: membership.personId, role: membership.role })
    .from(membership)
    .where(standing(workshopId));
  return new Map(rows.map(({ id, role }) => [id, role]));
}

function keepALead(roles: Map<string, Role>, personId: string): void {
  const others = [...roles].some(([id, role]) => id !== personId && role === 'lead');
  if (roles.get(personId) === 'lead' && !others)
    throw new Refusal(409, { detail: 'This is the only lead. Make somebody else a lead first.' });
}

/** Changes somebody's role; acts at their next request. 409 for the last lead. */
export async function changeRole(tx: Tx, who: Insider, id: string | undefined, role: Role): Promise<void> {
  const personId = idFrom(id);
  const workshopId = who.workshop.id;
  const roles = await holdRoles(tx, workshopId);
  if (!roles.has(personId)) throw notFound();
  if (role !== 'lead') keepALead(roles, personId);
  await tx
    .update(membership)
    .set({ role })
    .where(and(standing(workshopId), eq(membership.personId, personId)));
}

/** Ends somebody's membership; their name stays with what they did. 409 for the last lead. */
export async function removePerson(tx: Tx, who: Insider, id: string | undefined): Promise<void> {
  const personId = idFrom(id);
  const workshopId = who.workshop.id;
  const roles = await holdRoles(tx, workshopId);
  if (!roles.has(personId)) throw notFound();
  keepALead(roles, personId);
  await tx
    .update(membership)
    .set({ endedAt: new Date() })
    .where(and(standing(workshopId), eq(membership.personId, personId)));
}

/** Makes somebody a member, or a member again. */
export async function admit(tx: Tx, workshopId: string, personId: string, role: Role): Promise<void> {
  await tx
    .insert(membership)
    .values({ workshopId, personId, role })
    .onConflictDoUpdate({
      target: [membership.workshopId, membership.personId],
      set: { role, endedAt: null, createdAt: new Date() },
    });
}
