import type { Request, RequestHandler, Response, Router } from 'express';
import type { z } from 'zod';
import type { Actor } from '#server/actor.ts';
import { plainSentence } from '#server/http/plain-sentence.ts';
import { Refusal } from '#server/http/refusal.ts';
import type { Endpoint } from '#shared/contracts/endpoint.ts';
import { permits } from '#shared/permissions.ts';
import type { FieldError } from '#shared/problems.ts';

export interface Call<E extends Endpoint> {
  /** Signed in, except where the endpoint's access is `anyone`. */
  readonly actor: Actor;
  readonly maybeActor: Actor | undefined;
  readonly params: z.output<E['params']>;
  readonly query: z.output<E['query']>;
  readonly body: z.output<E['body']>;
  readonly req: Request;
  readonly res: Response;
}

export type Handler<E extends Endpoint> = (call: Call<E>) => Promise<z.input<E['response']> | void>;

/** One endpoint bound to what answers it, and middleware that must run before the body is parsed (an upload). */
export interface Route {
  readonly endpoint: Endpoint;
  readonly before: readonly RequestHandler[];
  readonly handle: (call: Call<Endpoint>) => Promise<unknown>;
}

/** Binds a handler to an endpoint. `before` runs after the access check and before the body is parsed. */
export function route<E extends Endpoint>(
  endpoint: E,
  handle: Handler<E>,
  before: readonly RequestHandler[] = [],
): Route {
  return { endpoint, before, handle: handle };
}

/** Mounts routes on a router: access check, parse in, handle, parse out. */
export function mount(router: Router, routes: readonly Route[]): void {
  for (const { endpoint, before, handle } of routes) {
    const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'delete';
    router[method](endpoint.path, checkAccess(endpoint), ...before, async (req: Request, res: Response) => {
      const call: Call<Endpoint> = {
        actor: req.user as Actor,
        maybeActor: req.user,
        params: parseParams(endpoint.params, req.params),
        query: parseInput(endpoint.query, req.query),
        body: endpoint.bodyKind === 'none' ? {} : parseInput(endpoint.body, req.body ?? {}),
        req,
        res,
      };
      const result = await handle(call);
      if (endpoint.responseKind === 'json') res.status(endpoint.status).json(endpoint.response.parse(result));
      else if (endpoint.responseKind === 'none') res.status(endpoint.status).end();
    });
  }
}

function checkAccess(endpoint: Endpoint): RequestHandler {
  return (req, _res, next) => {
    if (endpoint.access === 'anyone') return next();
    const actor = req.user;
    if (!actor)
      throw new Refusal('not-signed-in', 'Your session has ended or never began. Sign in and try again.');
    if (endpoint.access !== 'signed-in' && !permits(actor.roles, endpoint.access))
      throw new Refusal(
        'not-permitted',
        'None of your roles includes this. Ask an administrator of your laboratory.',
      );
    next();
  };
}

/** An id that cannot be one is an id that does not exist. */
function parseParams(schema: z.ZodType, input: unknown): unknown {
  const parsed = schema.safeParse(input);
  if (!parsed.success)
    throw new Refusal('not-found-or-not-yours', 'There is no such record, or it is not open to you.');
  return parsed.data;
}

/** All issues at once, each at its field, at most fifty. */
function parseInput(schema: z.ZodType, input: unknown): unknown {
  const parsed = schema.safeParse(input, { error: plainSentence });
  const unstorable = unstorablePaths(input);
  if (parsed.success && unstorable.length === 0) return parsed.data;
  const errors: FieldError[] = [
    ...unstorable.map((path) => ({
      pointer: pointerTo(path),
      detail: 'This holds characters that are no text (such as U+0000). Remove them.',
    })),
    ...(parsed.error?.issues ?? []).map((issue) => ({
      pointer: pointerTo(issue.path),
      detail: issue.message,
    })),
  ].slice(0, 50);
  const many = errors.length > 1;
  throw new Refusal(
    'invalid-input',
    many
      ? `${errors.length} values need a correction.`
      : (errors[0]?.detail ?? 'A value needs a correction.'),
    errors,
  );
}

function pointerTo(path: readonly PropertyKey[]): string {
  return '#' + path.map((step) => '/' + String(step).replaceAll('~', '~0').replaceAll('/', '~1')).join('');
}

/** Where the input holds text that no database stores (U+0000, halves of surrogate pairs) or nests without end. */
function unstorablePaths(input: unknown, path: readonly string[] = []): (readonly string[])[] {
  if (typeof input === 'string') return /[\u0000\p{Cs}]/u.test(input) ? [path] : [];
  if (typeof input !== 'object' || input === null) return [];
  if (path.length > 20) return [path];
  return Object.entries(input).flatMap(([key, value]) => unstorablePaths(value, [...path, key]));
}
