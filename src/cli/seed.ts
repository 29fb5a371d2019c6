import { configure } from '@/lib/server/settings';
import { openDatabase } from './local/database';
import { keptSecret, readEnvironment } from './local/environment';
import { accountLines, seedDemo } from './seed/demo';

const environment = readEnvironment();
const database = await openDatabase(environment);
try {
  configure({ ...environment, DATABASE_URL: database.url, AUTH_SECRET: environment.AUTH_SECRET ?? keptSecret() });
  for (const line of accountLines(await seedDemo())) console.log(line);
} finally {
  database.release();
}
process.exit(0);
