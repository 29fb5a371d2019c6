import { z } from 'zod';

const settingsSchema = z.object({
  /** What the application connects to. Every connection works as the role nineover_app. */
  DATABASE_URL: z.url(),
  AUTH_SECRET: z.string().min(32),
  /** The address people reach the site under, when a proxy stands before it. */
  PUBLIC_ORIGIN: z.url().optional(),
  LOG_LEVEL: z.enum(['debug', 'info', 'warn', 'error', 'silent']).default('info'),
});

export interface Settings {
  readonly databaseUrl: string;
  readonly authSecret: string;
  readonly publicOrigin: string | undefined;
  readonly logLevel: z.infer<typeof settingsSchema>['LOG_LEVEL'];
}

let configured: Settings | undefined;

/** Sets what the server works with: Astro's typed environment in the application, a test's or a command's own elsewhere. */
export function configure(values: Record<string, unknown>): Settings {
  const parsed = settingsSchema.parse(Object.fromEntries(Object.entries(values).filter(([, value]) => value !== '')));
  configured = {
    databaseUrl: parsed.DATABASE_URL,
    authSecret: parsed.AUTH_SECRET,
    publicOrigin: parsed.PUBLIC_ORIGIN,
    logLevel: parsed.LOG_LEVEL,
  };
  return configured;
}

export function settings(): Settings {
  if (!configured) throw new Error('The settings were asked for before they were configured.');
  return configured;
}
