import { v7 } from 'uuid';
import { acceptLayout } from '@/lib/mechanism/layout';
import { ROLE_WORDS, type Role } from '@/lib/policy';
import { hashPassword } from '@/lib/server/auth/password';
import type { Tx } from '@/lib/server/db/client';
import { schema } from '@/lib/server/db/client';
import { scoped, widen } from '@/lib/server/db/scope';
import { accountOf, addPerson } from '@/lib/server/store/accounts';
import { addExclusion } from '@/lib/server/store/exclusions';
import type { Insider } from '@/lib/server/store/insider';
import { createMachine } from '@/lib/server/store/machine-changes';
import { admit } from '@/lib/server/store/people';
import { appendSteps, finishRun, startRun } from '@/lib/server/store/run-log';
import { correctReading } from '@/lib/server/store/run-readings';
import { todayIn } from '@/lib/server/store/today';
import { perform } from './perform';
import { DEMO_RUNS, type DemoRun } from './runs';
import {
  DEMO_MACHINES,
  DEMO_PASSWORD,
  DEMO_PEOPLE,
  DEMO_WORKSHOP,
  type DemoMachine,
  type DemoPerson,
  NEIGHBOUR,
  NEIGHBOUR_WORKSHOP,
} from './workshop';

export interface DemoAccount {
  readonly role: Role;
  readonly email: string;
  readonly password: string;
  readonly workshop: string;
}

const ACCOUNTS: readonly DemoAccount[] = [
  ...DEMO_PEOPLE.map(({ role, email }) => ({ role, email, password: DEMO_PASSWORD, workshop: DEMO_WORKSHOP.name })),
  { role: 'tester', email: NEIGHBOUR.email, password: DEMO_PASSWORD, workshop: NEIGHBOUR_WORKSHOP.name },
];

type People = ReadonlyMap<DemoPerson, Insider>;

async function makePeople(tx: Tx): Promise<People> {
  const workshop = { id: v7() };
  await widen(tx, { workshop: workshop.id });
  await tx.insert(schema.workshop).values({ id: workshop.id, ...DEMO_WORKSHOP });
  const people = new Map<DemoPerson, Insider>();
  for (const { key, name, email, role } of DEMO_PEOPLE) {
    const id = await addPerson(tx, email, name, await hashPassword(DEMO_PASSWORD));
    await admit(tx, workshop.id, id, role);
    people.set(key, { workshop, person: { id } });
  }
  return people;
}

function insider(people: People, key: DemoPerson): Insider {
  const found = people.get(key);
  if (!found) throw new Error(`The demo has no ${key}.`);
  return found;
}

async function makeMachine(tx: Tx, people: People, made: DemoMachine): Promise<string> {
  const { name, serial, scale, state, turnsBefore, note, layout } = made;
  const id = await createMachine(tx, insider(people, 'lead'), {
    name,
    serial,
    scale,
    state,
    turnsBefore,
    note,
    layout,
  });
  const day = todayIn(DEMO_WORKSHOP.zone);
  for (const excluded of made.excluded) await addExclusion(tx, insider(people, 'builder'), id, excluded, day);
  return id;
}

async function makeRun(tx: Tx, people: People, machineId: string, made: DemoRun): Promise<void> {
  const who = insider(people, made.tester);
  const described = DEMO_MACHINES.find(({ key }) => key === made.machine)?.layout ?? {};
  const layout = acceptLayout(described);
  if (!layout.ok) throw new Error(`The demo's ${made.machine} has a layout that no machine can have.`);
  const id = await startRun(tx, who, {
    machine: machineId,
    title: made.title,
    note: made.note,
    startedAt: new Date(made.startedAt),
  });
  const { steps, corrections } = perform(made, layout.value);
  for (let from = 0; from < steps.length; from += 500)
    await appendSteps(tx, who, id, {
      seq: from + 1,
      entries: steps.slice(from, from + 500).map((one) => ({ ...one })),
    });
  for (const correction of corrections) await correctReading(tx, who, id, correction);
  const last = steps.at(-1);
  if (!made.unfinished) await finishRun(tx, who, id, new Date(last?.at.instant ?? made.startedAt));
}

/** A workshop of one tester, who must not see anything of the other. */
async function makeNeighbour(tx: Tx): Promise<void> {
  const id = v7();
  await widen(tx, { workshop: id });
  await tx.insert(schema.workshop).values({ id, ...NEIGHBOUR_WORKSHOP });
  const person = await addPerson(tx, NEIGHBOUR.email, NEIGHBOUR.name, await hashPassword(DEMO_PASSWORD));
  await admit(tx, id, person, 'tester');
}

/**
 * Puts the demo into the database, all of it or nothing, through the stores that the pages use. Does nothing where it
 * is already; answers with its accounts either way.
 */
export async function seedDemo(): Promise<readonly DemoAccount[]> {
  await scoped({}, async (tx) => {
    if (await accountOf(tx, DEMO_PEOPLE[0].email)) return;
    const people = await makePeople(tx);
    const machines = new Map<string, string>();
    for (const made of DEMO_MACHINES) machines.set(made.key, await makeMachine(tx, people, made));
    const inOrder = [...DEMO_RUNS].sort((a, b) => a.startedAt.localeCompare(b.startedAt));
    for (const made of inOrder) await makeRun(tx, people, machines.get(made.machine) ?? '', made);
    await makeNeighbour(tx);
  });
  return ACCOUNTS;
}

/** The accounts as the commands print them. */
export function accountLines(accounts: readonly DemoAccount[]): string[] {
  const width = Math.max(...accounts.map(({ email }) => email.length));
  const lines = accounts.map(
    ({ role, email, workshop }) => `  ${email.padEnd(width)}  ${ROLE_WORDS[role].name.toLowerCase()} of ${workshop}`,
  );
  return ['Demo accounts, all with the password', `  ${DEMO_PASSWORD}`, '', ...lines];
}
