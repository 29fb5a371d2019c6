/** A problem document of the server (RFC 9457), as far as a page uses it. */
export interface Problem {
  readonly status: number;
  readonly detail: string;
  readonly errors: readonly {
    readonly pointer: string;
    readonly detail: string;
  }[];
}

/**
 * What became of a call. `offline`: nobody answered. `busy`: the server could not just now (too many calls, its own
 * mistake): trying again may help. `signed-out`: nobody is signed in any more. `refused`: trying again will not help.
 */
export type Answer<T> =
  | { readonly ok: true; readonly value: T }
  | {
      readonly ok: false;
      readonly kind: 'offline' | 'busy' | 'signed-out' | 'refused';
      readonly problem: Problem;
    };

const NOBODY: Problem = {
  status: 0,
  detail: 'The server cannot be reached.',
  errors: [],
};

function kindOf(status: number): 'busy' | 'signed-out' | 'refused' {
  if (status === 401) return 'signed-out';
  return status === 408 || status === 429 || status >= 500 ? 'busy' : 'refused';
}

async function problemOf(response: Response): Promise<Problem> {
  const nothing = { detail: undefined, title: undefined, errors: undefined };
  const body = (await response.json().catch(() => nothing)) as Partial<Problem & { title: string }>;
  return {
    status: response.status,
    detail: body.detail ?? body.title ?? `The server answered with ${response.status}.`,
    errors: Array.isArray(body.errors) ? body.errors : [],
  };
}

/** Sends a body, JSON unless it is bytes, and reads what the server answers. Never throws. */
export async function call<T>(
  method: 'GET' | 'POST' | 'PATCH' | 'DELETE',
  path: string,
  body?: object,
  init: RequestInit = {},
): Promise<Answer<T>> {
  const bytes = body instanceof Blob;
  const type = bytes ? 'text/csv' : 'application/json';
  const sent =
    body === undefined
      ? {}
      : {
          body: bytes ? body : JSON.stringify(body),
          headers: { 'content-type': type },
        };
  try {
    const response = await fetch(path, { method, ...sent, ...init });
    if (!response.ok)
      return {
        ok: false,
        kind: kindOf(response.status),
        problem: await problemOf(response),
      };
    const value = response.status === 204 ? undefined : await response.json();
    return { ok: true, value: value as T };
  } catch {
    return { ok: false, kind: 'offline', problem: NOBODY };
  }
}

/** Everything a problem says, in one text: what is wrong, and where if that is not said already. */
export function problemWords({ detail, errors }: Problem): string {
  const more = errors.map((error) => error.detail).filter((text) => !detail.includes(text));
  return [detail, ...more.slice(0, 3)].join(' ');
}
