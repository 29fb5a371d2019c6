import type { APIRoute } from 'astro';
import { sql } from 'drizzle-orm';
import { database } from '@/lib/server/db/client';
import { json } from '@/lib/server/http';

/** A database that takes longer than this is not there for people either. */
const PATIENCE = 2000;

export const GET: APIRoute = async () => {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<false>((resolve) => {
    timer = setTimeout(() => resolve(false), PATIENCE);
  });
  const asked = database()
    .execute(sql`select 1`)
    .then(
      () => true,
      () => false,
    );
  const alive = await Promise.race([asked, late]);
  clearTimeout(timer);
  return alive ? json({ status: 'ok', database: 'ok' }) : json({ status: 'failing', database: 'unreachable' }, 503);
};
