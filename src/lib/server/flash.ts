import type { AstroCookies } from 'astro';

/** What a form did, told once on the next page. */
export interface Flash {
  readonly kind: 'done' | 'refused';
  readonly text: string;
}

const COOKIE = 'flash';
const OPTIONS = { path: '/', httpOnly: true, sameSite: 'lax' } as const;

export function tell(cookies: AstroCookies, kind: Flash['kind'], text: string): void {
  cookies.set(COOKIE, JSON.stringify({ kind, text: text.slice(0, 500) }), { ...OPTIONS, maxAge: 60 });
}

/** Reads and forgets. The text is shown as text, so a forged cookie can say no more than its forger could type. */
export function readFlash(cookies: AstroCookies): Flash | null {
  const kept = cookies.get(COOKIE);
  if (!kept) return null;
  cookies.delete(COOKIE, OPTIONS);
  try {
    const { kind, text } = kept.json() as Partial<Flash>;
    return (kind === 'done' || kind === 'refused') && typeof text === 'string' ? { kind, text } : null;
  } catch {
    return null;
  }
}
