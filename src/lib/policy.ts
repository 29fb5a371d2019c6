/** Who may do what, as one table. Guards on the server decide by it; islands only hide what it refuses. */

export const ROLES = ['lead', 'tester', 'builder', 'viewer'] as const;
export type Role = (typeof ROLES)[number];

/** What a role may do, in words shown where a lead chooses one. */
export const ROLE_WORDS: Record<Role, { name: string; does: string }> = {
  lead: { name: 'Lead', does: 'Everything: machines, plans, people and acceptance.' },
  tester: { name: 'Tester', does: 'Logs runs and corrects readings.' },
  builder: { name: 'Builder', does: 'Logs runs, records adjustments, changes excluded positions.' },
  viewer: { name: 'Viewer', does: 'Reads everything, changes nothing.' },
};

export const DEEDS = [
  'workshop:read',
  'run:log',
  'run:delete-empty',
  'exclusion:change',
  'adjustment:record',
  'machine:manage',
  'plan:manage',
  'people:manage',
  'acceptance:sign',
] as const;
export type Deed = (typeof DEEDS)[number];

const READ: readonly Deed[] = ['workshop:read'];
const LOG: readonly Deed[] = [...READ, 'run:log', 'run:delete-empty'];
const BUILD: readonly Deed[] = [...LOG, 'exclusion:change', 'adjustment:record'];

const ALLOWED: Record<Role, ReadonlySet<Deed>> = {
  viewer: new Set(READ),
  tester: new Set(LOG),
  builder: new Set(BUILD),
  lead: new Set(DEEDS),
};

export function may(role: Role, deed: Deed): boolean {
  return ALLOWED[role].has(deed);
}
