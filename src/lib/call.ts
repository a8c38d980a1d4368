import type { z } from 'zod';
import { address } from '#src/lib/address.ts';
import { readProblem, unreachable, unreadableAnswer } from '#src/lib/problem.ts';
import type { Endpoint } from '#shared/contracts/endpoint.ts';

interface Request<E extends Endpoint> {
  params?: z.input<E['params']>;
  query?: z.input<E['query']>;
  body?: z.input<E['body']>;
  signal?: AbortSignal;
}

/** Calls an endpoint and parses its answer by the contract. Throws `ApiProblem`; an abort is thrown as it is. */
export async function call<E extends Endpoint>(
  endpoint: E,
  request: Request<E> = {},
): Promise<z.output<E['response']>> {
  const response = await send(endpoint, request);
  if (endpoint.responseKind !== 'json') return {} as z.output<E['response']>;
  const parsed = endpoint.response.safeParse(await response.json().catch(() => undefined));
  if (!parsed.success) throw unreadableAnswer(response.status);
  return parsed.data as z.output<E['response']>;
}

/** Calls an endpoint that answers with bytes. */
export async function callForBytes<E extends Endpoint>(
  endpoint: E,
  request: Request<E> = {},
): Promise<ArrayBuffer> {
  const response = await send(endpoint, request);
  return response.arrayBuffer().catch(() => {
    throw unreachable();
  });
}

async function send<E extends Endpoint>(endpoint: E, request: Request<E>): Promise<globalThis.Response> {
  let response: globalThis.Response;
  try {
    response = await fetch(address(endpoint, request.params, request.query), {
      method: endpoint.method,
      signal: request.signal ?? null,
      credentials: 'same-origin',
      ...(endpoint.bodyKind === 'json'
        ? { headers: { 'content-type': 'application/json' }, body: JSON.stringify(request.body ?? {}) }
        : {}),
    });
  } catch (error) {
    if (request.signal?.aborted) throw error;
    throw unreachable();
  }
  if (!response.ok) throw readProblem(response.status, await response.text().catch(() => ''));
  return response;
}
