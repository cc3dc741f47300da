/** A browser without a screen: keeps cookies, follows nothing, says where it comes from as a browser would. */
import { inject } from 'vitest';

declare module 'vitest' {
  interface ProvidedContext {
    /** The running product, without a slash at the end. */
    baseUrl: string;
  }
}

export interface Sending {
  readonly method?: string;
  readonly json?: unknown;
  readonly form?: Readonly<Record<string, string>> | FormData;
  readonly headers?: Readonly<Record<string, string>>;
  /** null sends none. */
  readonly origin?: string | null;
}

export const baseUrl = (): string => inject('baseUrl');

export class Client {
  readonly cookies = new Map<string, string>();

  async send(path: string, sending: Sending = {}): Promise<Response> {
    const { json, form, origin = baseUrl() } = sending;
    const headers = new Headers(sending.headers);
    if (origin !== null) headers.set('origin', origin);
    if (this.cookies.size > 0)
      headers.set('cookie', [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; '));
    if (json !== undefined) headers.set('content-type', 'application/json');
    const hasBody = json !== undefined || form !== undefined;
    const response = await fetch(baseUrl() + path, {
      method: sending.method ?? (hasBody ? 'POST' : 'GET'),
      headers,
      redirect: 'manual',
      ...(hasBody && { body: bodyOf(json, form) }),
    });
    this.keep(response);
    return response;
  }

  private keep(response: Response): void {
    for (const line of response.headers.getSetCookie()) {
      const [pair = ''] = line.split(';');
      const [name = '', ...rest] = pair.split('=');
      if (/max-age=0/i.test(line)) this.cookies.delete(name);
      else this.cookies.set(name, rest.join('='));
    }
  }

  /** The session's cookie; its name depends on whether the product stands behind https. */
  get session(): string | undefined {
    return this.cookies.get('__Host-underkeel') ?? this.cookies.get('underkeel');
  }
}

export async function signedIn(email: string, password: string): Promise<Client> {
  const client = new Client();
  const answer = await client.send('/api/v1/session', { json: { email, password } });
  if (answer.status !== 204) throw new Error(`sign-in of ${email} was answered with ${answer.status}`);
  return client;
}

function bodyOf(json: unknown, form: Sending['form']): BodyInit {
  if (json !== undefined) return JSON.stringify(json);
  return form instanceof FormData ? form : new URLSearchParams(form);
}
