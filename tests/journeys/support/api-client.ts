import type { z } from 'zod';
import type { Endpoint } from '#shared/contracts/endpoint.ts';
import { signIn } from '#shared/contracts/session.ts';

/** A signed-in program: calls endpoints by their contract, keeps its cookie. */
export class ApiClient {
  readonly #url: string;
  #cookie = '';

  constructor(url: string) {
    this.#url = url;
  }

  async call<E extends Endpoint>(
    endpoint: E,
    input: {
      params?: Record<string, string>;
      query?: Record<string, string>;
      body?: unknown;
      form?: FormData;
    } = {},
  ): Promise<z.output<E['response']>> {
    const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) => input.params?.[name] ?? `:${name}`);
    const query = input.query ? `?${new URLSearchParams(input.query).toString()}` : '';
    const response = await fetch(this.#url + path + query, {
      method: endpoint.method,
      headers: {
        origin: this.#url,
        ...(this.#cookie ? { cookie: this.#cookie } : {}),
        ...(input.body === undefined ? {} : { 'content-type': 'application/json' }),
      },
      body: input.form ?? (input.body === undefined ? undefined : JSON.stringify(input.body)),
    });
    const cookie = response.headers.getSetCookie()[0]?.split(';')[0];
    if (cookie) this.#cookie = cookie;
    const text = await response.text();
    if (response.status !== endpoint.status)
      throw new Error(`${endpoint.name} answered ${response.status}: ${text.slice(0, 500)}`);
    return endpoint.response.parse(text ? JSON.parse(text) : {}) as z.output<E['response']>;
  }

  async signIn(email: string, password: string): Promise<void> {
    await this.call(signIn, { body: { email, password } });
  }
}
