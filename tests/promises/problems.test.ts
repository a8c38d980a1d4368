import express from 'express';
import { MulterError } from 'multer';
import request from 'supertest';
import { describe, expect, it } from 'vitest';
import { problemHandler, problemOf } from '#server/http/problem.ts';
import { Refusal } from '#server/http/refusal.ts';
import { createLog } from '#server/log.ts';
import { problemCodeSchema, problems, problemSchema, type ProblemCode } from '#shared/problems.ts';

const codes = Object.keys(problems) as ProblemCode[];

/** What a server answers, and logs, whose only handler throws the given thing. */
async function answerTo(thrown: unknown) {
  const logged: string[] = [];
  const app = express();
  app.get('/thing', () => {
    throw thrown;
  });
  app.use(problemHandler(createLog('error', { write: (line) => void logged.push(line) })));
  const response = await request(app).get('/thing?secret=1');
  return { response, problem: problemSchema.parse(JSON.parse(response.text)), logged };
}

describe('every refusal', () => {
  it.each(codes)(
    '%s has a title, an HTTP status of a refusal or fault, and a code of its own form',
    (code) => {
      const { status, title } = problems[code];
      expect(code).toMatch(/^[a-z]+(-[a-z]+)+$/);
      expect(title).toMatch(/^[A-Z][^.]*$/);
      expect(status).toBeGreaterThanOrEqual(400);
      expect(status).toBeLessThan(600);
      expect(problemCodeSchema.parse(code)).toBe(code);
    },
  );

  it.each(codes)('%s reaches the caller as problem details whose type ends in the code', async (code) => {
    const { response, problem, logged } = await answerTo(
      new Refusal(code, 'A sentence.', [{ pointer: '#/a', detail: 'B.' }]),
    );
    expect(response.headers['content-type']).toContain('application/problem+json');
    expect(response.status).toBe(problems[code].status);
    expect(problem).toMatchObject({
      code,
      status: problems[code].status,
      title: problems[code].title,
      detail: 'A sentence.',
      instance: '/thing',
      errors: [{ pointer: '#/a', detail: 'B.' }],
    });
    expect(new URL(problem.type).pathname.endsWith(`/${code}`)).toBe(true);
    expect(logged).toEqual([]);
  });
});

describe('a fault', () => {
  it('is logged once with its stack and number, and the answer says nothing of its cause', async () => {
    const { response, problem, logged } = await answerTo(new Error('relation "people" does not exist'));
    expect(response.status).toBe(500);
    expect(problem.code).toBe('internal-fault');
    expect(response.text).not.toContain('relation');
    expect(problem.detail).toContain(problem.requestId);
    expect(logged).toHaveLength(1);
    expect(logged[0]).toContain('relation');
    expect(logged[0]).toContain(problem.requestId);
    expect(logged[0]).not.toContain('secret');
  });

  it.each([undefined, null, 'text', 7, {}])(
    '%j thrown as such is still answered as a fault',
    async (thrown) => {
      // Express takes a thrown undefined or null for "no error".
      const { response } = await answerTo(thrown ?? new Error('nothing'));
      expect(response.status).toBe(500);
    },
  );
});

describe('what the parsers below refuse', () => {
  it.each<[unknown, ProblemCode]>([
    [new MulterError('LIMIT_FILE_SIZE'), 'file-too-large'],
    [new MulterError('LIMIT_UNEXPECTED_FILE'), 'malformed-request'],
    [new MulterError('LIMIT_FIELD_VALUE'), 'malformed-request'],
    [Object.assign(new Error('x'), { type: 'entity.too.large', status: 413 }), 'request-too-large'],
    [Object.assign(new Error('x'), { type: 'entity.parse.failed', status: 400 }), 'malformed-request'],
    [Object.assign(new Error('x'), { type: 'charset.unsupported', status: 415 }), 'malformed-request'],
    [Object.assign(new Error('x'), { status: 404 }), 'not-found-or-not-yours'],
    [new URIError('x'), 'malformed-request'],
  ])('%s becomes a refusal', async (thrown, code) => {
    const { response, problem, logged } = await answerTo(thrown);
    expect(problem.code).toBe(code);
    expect(response.status).toBe(problems[code].status);
    expect(logged).toEqual([]);
  });
});

it('a problem kept for later has no address and no number of a request', () => {
  expect(problemOf('picture-unusable', 'Too dark.')).toEqual({
    type: expect.stringMatching(/\/picture-unusable$/),
    title: problems['picture-unusable'].title,
    status: 422,
    detail: 'Too dark.',
    code: 'picture-unusable',
  });
});
