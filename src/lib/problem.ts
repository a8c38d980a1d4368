import { problemSchema, type FieldError, type ProblemCode } from '#shared/problems.ts';

/** Codes of the server, and the two that only the browser can meet. */
type ClientCode = ProblemCode | 'unreachable' | 'unreadable-answer';

/** A refusal or fault as the screen shows it: `title` says what happened, `message` what follows and what to do. */
export class ApiProblem extends Error {
  constructor(
    readonly code: ClientCode,
    readonly status: number,
    readonly title: string,
    detail: string,
    readonly errors: readonly FieldError[] = [],
  ) {
    super(detail);
    this.name = 'ApiProblem';
  }
}

export function unreachable(): ApiProblem {
  return new ApiProblem(
    'unreachable',
    0,
    'The server cannot be reached',
    'Nothing was stored. What you typed is kept here: check the connection and try again.',
  );
}

export function unreadableAnswer(status: number): ApiProblem {
  return new ApiProblem(
    'unreadable-answer',
    status,
    'The answer could not be read',
    'The server answered in a form that this page does not know. Load the page again; it may be older than the server.',
  );
}

/** Reads a problem document (RFC 9457); anything else becomes `unreadable-answer`. */
export function readProblem(status: number, text: string): ApiProblem {
  let json: unknown;
  try {
    json = JSON.parse(text);
  } catch {
    return status >= 502 && status <= 504 ? unreachable() : unreadableAnswer(status);
  }
  const parsed = problemSchema.safeParse(json);
  if (!parsed.success) return unreadableAnswer(status);
  const p = parsed.data;
  return new ApiProblem(p.code, p.status, p.title, p.detail, p.errors ?? []);
}

/** Any thrown thing as a problem to show. */
export function asProblem(error: unknown): ApiProblem {
  if (error instanceof ApiProblem) return error;
  return new ApiProblem(
    'unreadable-answer',
    0,
    'Something broke on this page',
    'What is stored is not touched. Load the page again; if it comes back, tell the administrator.',
  );
}
