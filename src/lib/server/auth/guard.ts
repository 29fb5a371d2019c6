import { type Deed, may, type Role } from '@/lib/policy';
import type { Tx } from '../db/client';
import { type Scope, scoped } from '../db/scope';
import { Refusal } from '../http';

/** The person behind a request and the workshop they stand in, as the session row says at this moment. */
export interface SignedIn {
  readonly sessionId: string;
  readonly person: { readonly id: string; readonly name: string; readonly email: string };
  readonly workshop: { readonly id: string; readonly name: string; readonly zone: string };
  readonly role: Role;
  /** All workshops the person belongs to, for switching. */
  readonly workshops: readonly { readonly id: string; readonly name: string }[];
}

/** What a guarded handler works with: who asks, and a transaction that sees only their workshop. */
export interface Member extends SignedIn {
  readonly inside: <T>(work: (tx: Tx) => Promise<T>) => Promise<T>;
}

/** Answers with the member or ends the request: 401 for a visitor, 403 where the policy refuses. */
export function requireMember(locals: App.Locals, deed: Deed): Member {
  const { signedIn } = locals;
  if (!signedIn) throw new Refusal(401);
  if (!may(signedIn.role, deed))
    throw new Refusal(403, { detail: `A ${signedIn.role} may not do this; ask a lead of ${signedIn.workshop.name}.` });
  const scope: Scope = { workshop: signedIn.workshop.id, person: signedIn.person.id };
  return { ...signedIn, inside: (work) => scoped(scope, work) };
}
