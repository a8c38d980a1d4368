import { z } from 'zod';
import type { Permission } from '#shared/permissions.ts';

export type Access = Permission | 'anyone' | 'signed-in';

/** What a request carries beside its path: JSON, one file with form fields, or nothing. */
type BodyKind = 'none' | 'json' | 'file';

/** What an answer carries: JSON, bytes (picture or pixels), or nothing. */
type ResponseKind = 'none' | 'json' | 'bytes';

const nothing = z.object({});

export interface Endpoint<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Response extends z.ZodType = z.ZodType,
> {
  readonly name: string;
  readonly method: 'GET' | 'POST' | 'PUT' | 'DELETE';
  /** Express path, `/api/…` with `:names` for the parameters. */
  readonly path: string;
  readonly access: Access;
  readonly params: Params;
  readonly query: Query;
  readonly body: Body;
  readonly response: Response;
  readonly bodyKind: BodyKind;
  readonly responseKind: ResponseKind;
  /** Status of a success. */
  readonly status: number;
}

interface Draft<P, Q, B, R> {
  name: string;
  method: Endpoint['method'];
  path: string;
  access: Access;
  params?: P;
  query?: Q;
  body?: B;
  response?: R;
  bodyKind?: BodyKind;
  responseKind?: ResponseKind;
  status?: number;
}

/** Declares an endpoint once, for the server's route, the client's call and the tests. */
export function endpoint<
  P extends z.ZodType = typeof nothing,
  Q extends z.ZodType = typeof nothing,
  B extends z.ZodType = typeof nothing,
  R extends z.ZodType = typeof nothing,
>(draft: Draft<P, Q, B, R>): Endpoint<P, Q, B, R> {
  return {
    name: draft.name,
    method: draft.method,
    path: draft.path,
    access: draft.access,
    params: (draft.params ?? nothing) as P,
    query: (draft.query ?? nothing) as Q,
    body: (draft.body ?? nothing) as B,
    response: (draft.response ?? nothing) as R,
    bodyKind: draft.bodyKind ?? (draft.body ? 'json' : 'none'),
    responseKind: draft.responseKind ?? (draft.response ? 'json' : 'none'),
    status: draft.status ?? (draft.response || draft.responseKind === 'bytes' ? 200 : 204),
  };
}
