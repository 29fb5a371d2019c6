export const TEST_PASSWORD = 'seven slides and a crank';

/** A browser without a window: keeps cookies, sends its origin with forms, follows nothing by itself. */
export class Visitor {
  readonly cookies = new Map<string, string>();

  constructor(readonly base: string) {}

  async fetch(path: string, init: RequestInit = {}): Promise<Response> {
    const headers = new Headers(init.headers);
    if (this.cookies.size > 0)
      headers.set('cookie', [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; '));
    if (!headers.has('origin') && init.method && init.method !== 'GET') headers.set('origin', this.base);
    const response = await fetch(new URL(path, this.base), { redirect: 'manual', ...init, headers });
    for (const line of response.headers.getSetCookie()) this.#keep(line);
    return response;
  }

  #keep(line: string): void {
    const [pair = '', ...attributes] = line.split(';');
    const at = pair.indexOf('=');
    const name = pair.slice(0, at).trim();
    const gone = attributes.some((one) => /^\s*max-age=0\s*$/i.test(one) || /expires=thu, 01 jan 1970/i.test(one));
    if (gone) this.cookies.delete(name);
    else this.cookies.set(name, pair.slice(at + 1));
  }

  get(path: string): Promise<Response> {
    return this.fetch(path);
  }

  form(path: string, fields: Record<string, string>): Promise<Response> {
    return this.fetch(path, { method: 'POST', body: new URLSearchParams(fields) });
  }

  send(method: 'POST' | 'PATCH' | 'PUT' | 'DELETE', path: string, body?: unknown): Promise<Response> {
    return this.fetch(path, {
      method,
      headers: { 'content-type': 'application/json' },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
  }

  async signIn(email: string, password = TEST_PASSWORD): Promise<Response> {
    return this.form('/sign-in', { email, password });
  }
}
