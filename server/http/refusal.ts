import { problems, type FieldError, type ProblemCode } from '#shared/problems.ts';

/** Something expected that the caller can act on; `detail` says what happened and what to do. */
export class Refusal extends Error {
  readonly code: ProblemCode;
  readonly errors: readonly FieldError[];

  constructor(code: ProblemCode, detail: string, errors: readonly FieldError[] = []) {
    super(detail);
    this.name = 'Refusal';
    this.code = code;
    this.errors = errors;
  }

  get status(): number {
    return problems[this.code].status;
  }
}

/** "Missing" and "not yours" read the same, so that nobody learns what exists. */
export function notFound(what: string): Refusal {
  return new Refusal('not-found-or-not-yours', `There is no such ${what}, or it is not open to you.`);
}
