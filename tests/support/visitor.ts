/** What came back: the body is parsed where it is JSON. */
export interface Answer {
  readonly status: number;
  // Tests read answers field by field; each expectation states what it wants to find.
  readonly body: unknown;
  readonly headers: Headers;
}

/** A browser without a screen: keeps its cookie, says where it comes from. */
export class Visitor {
  readonly #url: string;
  #cookie: string | null = null;

  constructor(url: string) {
    this.#url = url;
  }

  get cookie(): string | null {
    return this.#cookie;
  }

  get = (path: string): Promise<Answer> => this.send('GET', path);
  post = (path: string, body?: unknown): Promise<Answer> => this.send('POST', path, body);
  put = (path: string, body?: unknown): Promise<Answer> => this.send('PUT', path, body);
  patch = (path: string, body?: unknown): Promise<Answer> => this.send('PATCH', path, body);
  delete = (path: string): Promise<Answer> => this.send('DELETE', path);

  async send(
    method: string,
    path: string,
    body?: unknown,
    headers: Readonly<Record<string, string>> = {},
  ): Promise<Answer> {
    const form = body instanceof FormData;
    const response = await fetch(this.#url + path, {
      method,
      redirect: 'manual',
      headers: {
        origin: this.#url,
        ...(this.#cookie === null ? {} : { cookie: this.#cookie }),
        ...(body === undefined || form ? {} : { 'content-type': 'application/json' }),
        ...headers,
      },
      ...(body === undefined ? {} : { body: form ? body : JSON.stringify(body) }),
    });
    for (const cookie of response.headers.getSetCookie()) this.#cookie = cookie.split(';')[0] ?? null;
    const text = await response.text();
    const json = response.headers.get('content-type')?.includes('json') ?? false;
    return {
      status: response.status,
      body: json ? (JSON.parse(text) as unknown) : text,
      headers: response.headers,
    };
  }
}
