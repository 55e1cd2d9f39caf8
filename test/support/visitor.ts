/** What came back, read to the end. */
export interface Answer {
  readonly status: number;
  readonly headers: Headers;
  readonly text: string;
  /** Where a redirect points, if it is one. */
  readonly location: string | null;
}

export interface Sending {
  readonly method?: string;
  readonly headers?: Readonly<Record<string, string>>;
  readonly body?: string;
}

/** A browser reduced to what matters here: it keeps cookies, names its origin, and follows nothing. */
export class Visitor {
  readonly cookies = new Map<string, string>();

  constructor(readonly url: string) {}

  async send(path: string, sending: Sending = {}): Promise<Answer> {
    const cookie = [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
    const response = await fetch(`${this.url}${path}`, {
      method: sending.method ?? 'GET',
      redirect: 'manual',
      headers: {
        accept: 'text/html',
        ...(cookie !== '' && { cookie }),
        ...sending.headers,
      },
      ...(sending.body !== undefined && { body: sending.body }),
    });
    for (const line of response.headers.getSetCookie()) {
      const [, name, value] = /^([^=]+)=([^;]*)/.exec(line) ?? [];
      if (name === undefined || value === undefined) continue;
      if (value === '') this.cookies.delete(name);
      else this.cookies.set(name, value);
    }
    return {
      status: response.status,
      headers: response.headers,
      text: await response.text(),
      location: response.headers.get('location'),
    };
  }

  async get(path: string, headers: Readonly<Record<string, string>> = {}): Promise<Answer> {
    return this.send(path, { headers });
  }

  /** Sends a form, with the token of this visitor's session when there is one. */
  async post(
    path: string,
    fields: Readonly<Record<string, string>>,
    headers: Readonly<Record<string, string>> = {},
  ): Promise<Answer> {
    const token = await this.formToken();
    return this.send(path, {
      method: 'POST',
      headers: {
        origin: this.url,
        'content-type': 'application/x-www-form-urlencoded',
        ...headers,
      },
      body: new URLSearchParams({
        ...(token !== undefined && { formToken: token }),
        ...fields,
      }).toString(),
    });
  }

  async postJson(path: string, value: unknown): Promise<Answer> {
    return this.send(path, {
      method: 'POST',
      headers: {
        origin: this.url,
        'content-type': 'application/json',
        accept: 'application/json',
      },
      body: JSON.stringify(value),
    });
  }

  /** The token that the forms of this session carry, read off a page as a browser would have it. */
  async formToken(): Promise<string | undefined> {
    if (this.cookies.size === 0) return undefined;
    const { text } = await this.get('/account');
    return /name="formToken" value="([^"]+)"/.exec(text)?.[1];
  }
}
