import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { parseEnv } from 'node:util';
import { LOCAL, ROOT } from './places';

/** The settings of the shell over those of `.env`; a setting left empty counts as unset. */
export function readEnvironment(): Record<string, string | undefined> {
  const file = path.join(ROOT, '.env');
  const fromFile = existsSync(file) ? parseEnv(readFileSync(file, 'utf8')) : {};
  const all = { ...fromFile, ...process.env };
  return Object.fromEntries(Object.entries(all).filter(([, value]) => value !== ''));
}

/** The secret that signs session tokens: made once and kept, so that a restart signs nobody out. */
export function keptSecret(): string {
  const file = path.join(LOCAL, 'auth-secret');
  if (!existsSync(file)) writeFileSync(file, randomBytes(48).toString('base64url'), { mode: 0o600 });
  return readFileSync(file, 'utf8').trim();
}
