import { createHash } from 'node:crypto';
import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The project's folder. */
export const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../../..');

/** Everything a machine keeps for itself; git ignores it. */
export const LOCAL = path.join(ROOT, '.local');
mkdirSync(LOCAL, { recursive: true });

export const MIGRATIONS = path.join(ROOT, 'drizzle');

/** Tells this clone from another one on the same machine. */
export const CLONE = createHash('sha256').update(ROOT).digest('hex').slice(0, 12);
