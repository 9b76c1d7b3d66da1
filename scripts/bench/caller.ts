import { demoPassword } from '../../server/demo/accounts';

/** Headers of a person who has signed in, as a browser would send them. */
export interface Caller {
  readonly headers: Readonly<Record<string, string>>;
  readonly call: <T>(method: string, path: string, body?: unknown) => Promise<T>;
}

function keep(jar: Map<string, string>, response: Response): void {
  for (const line of response.headers.getSetCookie()) {
    const [pair = ''] = line.split(';');
    const cut = pair.indexOf('=');
    jar.set(pair.slice(0, cut), pair.slice(cut + 1));
  }
}

const headersOf = (jar: ReadonlyMap<string, string>): Record<string, string> => ({
  'content-type': 'application/json',
  cookie: [...jar].map(([name, value]) => `${name}=${value}`).join('; '),
  'x-xsrf-token': decodeURIComponent(jar.get('XSRF-TOKEN') ?? ''),
});

/** Signs a demonstration account in. */
export async function signIn(url: string, who: string): Promise<Caller> {
  const jar = new Map<string, string>();
  keep(jar, await fetch(`${url}/api/auth/session`));
  const email = `${who}@harborlane.example`;
  const answer = await fetch(`${url}/api/auth/sign-in`, {
    method: 'POST',
    headers: headersOf(jar),
    body: JSON.stringify({ email, password: demoPassword }),
  });
  if (!answer.ok) throw new Error(`${email} could not sign in: ${answer.status}`);
  keep(jar, answer);
  const headers = headersOf(jar);
  return {
    headers,
    call: async <T>(method: string, path: string, body?: unknown): Promise<T> => {
      const response = await fetch(`${url}${path}`, {
        method,
        headers,
        ...(body !== undefined && { body: JSON.stringify(body) }),
      });
      if (!response.ok) throw new Error(`${method} ${path}: ${await response.text()}`);
      return (await response.json()) as T;
    },
  };
}
