import { startApp } from '@tests/helpers/app';
import { dropDatabase } from '@tests/helpers/database';
import { expect, it } from 'vitest';

it('health says so when the database is gone, and the public calls go on judging', async () => {
  const app = await startApp();
  const visitor = app.visitor();
  const alive = await visitor.get('/api/v1/health');
  expect([alive.status, await alive.json()]).toEqual([200, { status: 'ok', database: 'ok' }]);
  await dropDatabase(app.database.name);
  const gone = await visitor.get('/api/v1/health');
  expect([gone.status, await gone.json()]).toEqual([503, { status: 'failing', database: 'unreachable' }]);
  const judged = await visitor.send('POST', '/api/v1/simulate', { steps: [{ do: 'turn', way: 'add' }] });
  expect(judged.status).toBe(200);
});
