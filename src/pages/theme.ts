import type { APIRoute } from 'astro';
import { needsSecureCookies } from '@/lib/server/auth/config';
import { readTheme, THEME_COOKIE } from '@/lib/theme';

const YEAR = 365 * 24 * 60 * 60;

export const POST: APIRoute = async ({ request, cookies, redirect, url }) => {
  const form = await request.formData();
  const back = String(form.get('back') ?? '/');
  cookies.set(THEME_COOKIE, readTheme(String(form.get('theme'))), {
    path: '/',
    maxAge: YEAR,
    httpOnly: true,
    sameSite: 'lax',
    secure: needsSecureCookies(url),
  });
  const inside = back.startsWith('/') && !back.startsWith('//') && !back.includes('\\');
  return redirect(inside ? back : '/', 303);
};
