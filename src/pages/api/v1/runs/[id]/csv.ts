import { attachment } from '@/lib/server/attachment';
import { requireMember } from '@/lib/server/auth/guard';
import { endpoint, refuseInput } from '@/lib/server/http';
import { exportRun } from '@/lib/server/store/run-imports';

/** The run as CSV, exact; `form=spreadsheet` guards notes that a spreadsheet would take for formulas. */
export const GET = endpoint(async ({ locals, params, url }) => {
  const member = requireMember(locals, 'workshop:read');
  const form = url.searchParams.get('form') ?? 'exact';
  if (form !== 'exact' && form !== 'spreadsheet')
    refuseInput([{ pointer: '/form', detail: 'Give exact or spreadsheet.' }]);
  const { number, text } = await member.inside((tx) => exportRun(tx, member, params.id, form === 'spreadsheet'));
  return attachment(new TextEncoder().encode(text), `run-${number}.csv`, 'text/csv; charset=utf-8; header=present');
});
