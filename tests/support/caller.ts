import type { Express } from 'express';
import request, { type Response } from 'supertest';
import { expect } from 'vitest';
import type { z } from 'zod';
import type { Endpoint } from '#shared/contracts/endpoint.ts';
import { problems, problemSchema, type Problem, type ProblemCode } from '#shared/problems.ts';

export interface CallInput {
  readonly params?: Record<string, string>;
  readonly query?: Record<string, string | number>;
  /** Also the form fields beside a file. */
  readonly body?: unknown;
  readonly file?: { readonly name: string; readonly bytes: Uint8Array };
  readonly headers?: Record<string, string>;
}

/** Somebody at the API, with a cookie jar of their own. */
export class Caller {
  readonly #agent: ReturnType<typeof request.agent>;

  constructor(app: Express) {
    this.#agent = request.agent(app);
  }

  /** The bare answer. */
  async send(endpoint: Endpoint, input: CallInput = {}): Promise<Response> {
    const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) => input.params?.[name] ?? `:${name}`);
    const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'delete';
    const call = this.#agent[method](path).query(input.query ?? {});
    for (const [name, value] of Object.entries(input.headers ?? {})) call.set(name, value);
    if (input.file) {
      for (const [name, value] of Object.entries((input.body ?? {}) as Record<string, string>))
        call.field(name, value);
      return call.attach('file', Buffer.from(input.file.bytes), input.file.name);
    }
    return input.body === undefined ? call : call.send(input.body as object);
  }

  /** Anything that no endpoint describes. */
  get raw() {
    return this.#agent;
  }

  /** The answer of a success, parsed by the contract. */
  async call<E extends Endpoint>(endpoint: E, input: CallInput = {}): Promise<z.output<E['response']>> {
    const response = await this.send(endpoint, input);
    expect(response.status, `${endpoint.name}: ${response.text}`).toBe(endpoint.status);
    return (
      endpoint.responseKind === 'json' ? endpoint.response.parse(response.body) : response.body
    ) as z.output<E['response']>;
  }

  /** The problem of a refusal, with the status that its code has. */
  async refused(endpoint: Endpoint, code: ProblemCode, input: CallInput = {}): Promise<Problem> {
    return problemIn(await this.send(endpoint, input), code);
  }
}

export function problemIn(response: Response, code: ProblemCode): Problem {
  expect(response.headers['content-type'], response.text).toContain('application/problem+json');
  const problem = problemSchema.parse(JSON.parse(response.text));
  expect({ code: problem.code, status: response.status }, response.text).toEqual({
    code,
    status: problems[code].status,
  });
  expect(problem.status).toBe(response.status);
  expect(problem.detail).toMatch(/^[A-Z0-9].*[.]$/s);
  return problem;
}
