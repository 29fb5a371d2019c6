import { spawn } from 'node:child_process';
import path from 'node:path';
import { configure } from '@/lib/server/settings';
import { openDatabase } from './local/database';
import { keptSecret, readEnvironment } from './local/environment';
import { ROOT } from './local/places';
import { accountLines, seedDemo } from './seed/demo';

const environment = readEnvironment();
const database = await openDatabase(environment);
const authSecret = environment.AUTH_SECRET ?? keptSecret();
configure({ ...environment, DATABASE_URL: database.url, AUTH_SECRET: authSecret });
for (const line of accountLines(await seedDemo())) console.log(line);
const astro = path.join(ROOT, 'node_modules', 'astro', 'astro.js');
const child = spawn(process.execPath, [astro, 'dev', '--port', environment.PORT ?? '4321', ...process.argv.slice(2)], {
  cwd: ROOT,
  stdio: 'inherit',
  env: {
    ...process.env,
    ...environment,
    DATABASE_URL: database.url,
    AUTH_SECRET: authSecret,
    ASTRO_TELEMETRY_DISABLED: '1',
  },
});
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, () => child.kill(signal));
child.on('exit', (code) => {
  database.release();
  process.exit(code ?? 0);
});
