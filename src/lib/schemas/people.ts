import { z } from 'zod';
import { ROLES } from '@/lib/policy';
import { LIMITS } from './limits';

export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .max(LIMITS.emailLength, `At most ${LIMITS.emailLength} characters.`)
  .pipe(z.email('This is not an e-mail address.'));

export const personNameSchema = z
  .string()
  .trim()
  .min(1, 'A name is needed.')
  .max(LIMITS.nameLength, `At most ${LIMITS.nameLength} characters.`);

export const workshopNameSchema = z
  .string()
  .trim()
  .min(1, 'The workshop needs a name.')
  .max(LIMITS.nameLength, `At most ${LIMITS.nameLength} characters.`);

/** IANA time zone that this server knows. */
export const zoneSchema = z.string().refine((zone) => {
  try {
    new Intl.DateTimeFormat('en', { timeZone: zone });
    return true;
  } catch {
    return false;
  }
}, 'This is not a time zone that we know.');

export const roleSchema = z.enum(ROLES, `One of ${ROLES.join(', ')}.`);

export const invitationSchema = z.strictObject({ email: emailSchema, name: personNameSchema, role: roleSchema });
export type NewInvitation = z.output<typeof invitationSchema>;

export const roleChangeSchema = z.strictObject({ role: roleSchema });

export const signInSchema = z.object({
  email: z.string().trim().toLowerCase().min(1, 'Your e-mail address is needed.').max(LIMITS.emailLength),
  password: z
    .string()
    .min(1, 'Your password is needed.')
    .max(4 * LIMITS.passwordTo),
});

export const signUpSchema = z.object({
  workshop: workshopNameSchema,
  name: personNameSchema,
  email: emailSchema,
  password: z.string(),
  zone: zoneSchema,
});

/** Fields of a form as text; files and repeated names are not expected on these pages. */
export function formFields(form: FormData): Record<string, string> {
  return Object.fromEntries([...form].filter((entry): entry is [string, string] => typeof entry[1] === 'string'));
}

/** First message of each field that is wrong. */
export function fieldErrors(error: z.ZodError): Record<string, string> {
  const errors: Record<string, string> = {};
  for (const issue of error.issues) errors[String(issue.path[0] ?? '')] ??= issue.message;
  return errors;
}

/** What the interface answers about people and invitations. */
export interface PersonShown {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly role: (typeof ROLES)[number];
  readonly since: string;
}
export interface InvitationShown {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly role: (typeof ROLES)[number];
  readonly createdAt: string;
  readonly expiresAt: string;
  readonly expired: boolean;
}
