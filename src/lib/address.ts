import type { z } from 'zod';
import type { Endpoint } from '#shared/contracts/endpoint.ts';

/** The URL of an endpoint with its parameters and query filled in; undefined query values are left out. */
export function address<E extends Endpoint>(
  endpoint: E,
  params?: z.input<E['params']>,
  query?: z.input<E['query']>,
): string {
  const values = (params ?? {}) as Record<string, string>;
  const path = endpoint.path.replace(/:(\w+)/g, (_, key: string) => encodeURIComponent(values[key] ?? ''));
  const search = new URLSearchParams();
  const asked: Record<string, string | number | undefined> = { ...(query as object) };
  for (const [key, value] of Object.entries(asked))
    if (value !== undefined && value !== '') search.set(key, String(value));
  const text = search.toString();
  return text ? `${path}?${text}` : path;
}
