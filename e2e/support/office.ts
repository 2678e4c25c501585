/** The demo's office accounts, as its first page shows them. */
export const ACCOUNTS = {
  admin: { email: 'desmond@brindle-lane.example', password: 'desmond-shows-the-demo' },
  clerk: { email: 'perrin@brindle-lane.example', password: 'perrin-shows-the-demo' },
  supervisor: { email: 'tobias@brindle-lane.example', password: 'tobias-shows-the-demo' },
} as const;

/** Speaks to the office's API as a signed-in person. */
export interface OfficeSession {
  call<T>(method: string, path: string, body?: unknown): Promise<T>;
}

/** Signs in at the office and keeps the session. */
export async function signInOffice(url: string, account: { email: string; password: string }): Promise<OfficeSession> {
  const json = { 'content-type': 'application/json' };
  const answer = await fetch(`${url}/api/office/sign-in`, {
    method: 'POST',
    headers: json,
    body: JSON.stringify(account),
  });
  if (!answer.ok) throw new Error(`sign-in answered ${answer.status}: ${await answer.text()}`);
  const { csrf } = (await answer.json()) as { csrf: string };
  const cookie = answer.headers
    .getSetCookie()
    .map((line) => line.split(';')[0])
    .join('; ');
  return {
    async call<T>(method: string, path: string, body?: unknown): Promise<T> {
      const headers = { ...json, cookie, 'x-boltwalk-csrf': csrf };
      const sent = await fetch(url + path, {
        method,
        headers,
        ...(body === undefined ? {} : { body: JSON.stringify(body) }),
      });
      if (!sent.ok) throw new Error(`${method} ${path} answered ${sent.status}: ${await sent.text()}`);
      return (await sent.json()) as T;
    },
  };
}
