import { randomUUID } from 'node:crypto';
import type { ErrorRequestHandler } from 'express';
import { MulterError } from 'multer';
import type { Logger } from 'pino';
import { notFound, Refusal } from '#server/http/refusal.ts';
import { pictureLimits } from '#shared/contracts/exposures.ts';
import { problems, type Problem, type ProblemCode } from '#shared/problems.ts';

/** A problem document (RFC 9457) without the parts that belong to one request. */
export function problemOf(code: ProblemCode, detail: string, errors?: Problem['errors']): Problem {
  const { status, title } = problems[code];
  return {
    type: `https://fringeward.invalid/problems/${code}`,
    title,
    status,
    detail,
    code,
    ...(errors && errors.length > 0 ? { errors: [...errors] } : {}),
  };
}

/** The only mapper from what was thrown to what is answered. A fault is logged once and tells nothing of its cause. */
export function problemHandler(log: Logger): ErrorRequestHandler {
  return (error: unknown, req, res, next) => {
    if (res.headersSent) return next(error);
    const requestId = randomUUID();
    const refusal = asRefusal(error);
    if (!refusal) log.error({ err: error, requestId, method: req.method, path: req.path }, 'a request broke');
    const problem = refusal
      ? problemOf(refusal.code, refusal.message, [...refusal.errors])
      : problemOf(
          'internal-fault',
          `Something broke on the server; nothing was stored. Try again, and give the administrator this number: ${requestId}.`,
        );
    res
      .status(problem.status)
      .type('application/problem+json')
      .send(JSON.stringify({ ...problem, instance: req.path, requestId }));
  };
}

function asRefusal(error: unknown): Refusal | undefined {
  if (error instanceof Refusal) return error;
  if (error instanceof MulterError)
    return error.code === 'LIMIT_FILE_SIZE'
      ? new Refusal(
          'file-too-large',
          `The file is larger than ${pictureLimits.bytes / 2 ** 20} MiB. Crop it about the pattern or bin its pixels.`,
        )
      : new Refusal(
          'malformed-request',
          'Send one file in the field "file", with the form fields before it.',
        );
  if (error instanceof URIError) return new Refusal('malformed-request', 'The address could not be read.');
  const { type, status } = (error ?? {}) as { type?: unknown; status?: unknown };
  if (type === 'entity.too.large')
    return new Refusal('request-too-large', 'The request is larger than 200 kB. Shorten the longest text.');
  if (type === 'entity.parse.failed')
    return new Refusal('malformed-request', 'The request body is not valid JSON.');
  // What the parsers and the file server below refuse carries a status of its own.
  if (status === 404) return notFound('file');
  if (typeof status === 'number' && status >= 400 && status < 500)
    return new Refusal(
      'malformed-request',
      'The request could not be read: its form, encoding or length is wrong.',
    );
  return undefined;
}
