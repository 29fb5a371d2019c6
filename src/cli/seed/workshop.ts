import type { LayoutDescription } from '@/lib/mechanism/layout';
import type { Register } from '@/lib/mechanism/steps';
import type { Role } from '@/lib/policy';
import type { MachineState } from '@/lib/schemas/machines';

/** The demo's invented workshop. Every person, machine and event in it is made up. */
export const DEMO_WORKSHOP = {
  name: 'Tallow Yard Workshop',
  zone: 'Europe/Berlin',
} as const;

/** One password for all demo accounts; long enough for the rules, and printed wherever the accounts are. */
export const DEMO_PASSWORD = 'nine turns to zero';

export const DEMO_PEOPLE = [
  {
    key: 'lead',
    name: 'Orsel Vane',
    email: 'lead@tallow-yard.example',
    role: 'lead',
  },
  {
    key: 'tester',
    name: 'Mirrin Tolk',
    email: 'tester@tallow-yard.example',
    role: 'tester',
  },
  {
    key: 'builder',
    name: 'Jostein Arbel',
    email: 'builder@tallow-yard.example',
    role: 'builder',
  },
  {
    key: 'viewer',
    name: 'Pell Wintrow',
    email: 'viewer@tallow-yard.example',
    role: 'viewer',
  },
] as const satisfies readonly {
  key: string;
  name: string;
  email: string;
  role: Role;
}[];
export type DemoPerson = (typeof DEMO_PEOPLE)[number]['key'];

/** A second, small workshop, so that the wall between workshops can be tried by hand. */
export const NEIGHBOUR_WORKSHOP = {
  name: 'Saltmarsh Cranks',
  zone: 'Europe/London',
} as const;
export const NEIGHBOUR = {
  name: 'Edda Quorn',
  email: 'tester@saltmarsh.example',
} as const;

export interface DemoMachine {
  readonly key: string;
  readonly name: string;
  readonly serial: string;
  readonly scale: number | null;
  readonly state: MachineState;
  readonly turnsBefore: number;
  readonly note: string;
  readonly layout: LayoutDescription;
  readonly excluded: readonly {
    readonly register: Register;
    readonly wheel: number;
    readonly reason: string;
    readonly since: string;
  }[];
}

export const DEMO_MACHINES: readonly DemoMachine[] = [
  {
    key: 'heron',
    name: 'Heron',
    serial: 'TY-02-004',
    scale: 2,
    state: 'under-test',
    turnsBefore: 420,
    note: 'Printed at twice the original size, brass carry pins. Round parts finished by hand.',
    layout: {},
    excluded: [
      {
        register: 'result',
        wheel: 10,
        reason: 'Gear held by its clip only; to be fixed after running in.',
        since: '2026-11-09',
      },
      {
        register: 'result',
        wheel: 11,
        reason: 'Gear held by its clip only; to be fixed after running in.',
        since: '2026-11-09',
      },
    ],
  },
  {
    key: 'bittern',
    name: 'Bittern',
    serial: 'TY-03-001',
    scale: 3,
    state: 'running-in',
    turnsBefore: 0,
    note: 'Three times the size, for the teaching bench. Wide register, generous play along the shaft.',
    layout: {
      settingSlides: 11,
      resultWheels: 15,
      counterWheels: 8,
      carriagePositions: 8,
    },
    excluded: [],
  },
  {
    key: 'avocet',
    name: 'Avocet',
    serial: 'R-117',
    scale: null,
    state: 'accepted',
    turnsBefore: 15_200,
    note: 'Restored for a collection. Turns backward to subtract; the counter has no carry of its own.',
    layout: {
      settingSlides: 9,
      resultWheels: 13,
      counterWheels: 8,
      carriagePositions: 8,
      subtraction: 'reverse',
      counterCarry: false,
    },
    excluded: [],
  },
  {
    key: 'dunlin',
    name: 'Dunlin',
    serial: 'TY-02-005',
    scale: 2,
    state: 'being-built',
    turnsBefore: 0,
    note: 'Frame and drums done; the carriage is waiting for its detents.',
    layout: { resultCarry: 8 },
    excluded: [
      {
        register: 'counter',
        wheel: 6,
        reason: 'Numeral wheel not printed yet.',
        since: '2026-11-23',
      },
    ],
  },
];
