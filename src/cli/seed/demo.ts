import { DEMO_PASSWORD, DEMO_PEOPLE, DEMO_WORKSHOP } from './workshop';
export interface DemoAccount {
  readonly role: string;
  readonly email: string;
  readonly password: string;
}
export async function seedDemo(): Promise<DemoAccount[]> {
  return DEMO_PEOPLE.map(({ role, email }) => ({ role, email, password: DEMO_PASSWORD }));
}
export function accountLines(accounts: readonly DemoAccount[]): string[] {
  return [DEMO_WORKSHOP.name, ...accounts.map((a) => `${a.role} ${a.email} ${a.password}`)];
}
