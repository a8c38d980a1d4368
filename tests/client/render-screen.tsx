import { QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render } from '@testing-library/react';
import type { ReactNode } from 'react';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, expect, vi } from 'vitest';
import { createQueryClient } from '#src/lib/query.ts';
import { problems, type FieldError, type ProblemCode } from '#shared/problems.ts';

/** What jsdom lacks: a canvas that draws, a media query that answers, a dialog that opens. */
beforeEach(() => {
  HTMLCanvasElement.prototype.getContext = () => null;
  window.matchMedia ??= (query: string) =>
    ({ matches: false, media: query, addEventListener() {}, removeEventListener() {} }) as never;
  HTMLDialogElement.prototype.showModal ??= function (this: HTMLDialogElement) {
    this.open = true;
  };
  HTMLDialogElement.prototype.close ??= function (this: HTMLDialogElement) {
    this.open = false;
  };
  vi.spyOn(console, 'error');
  vi.spyOn(console, 'warn');
});

/** A complaint that no test expects is a failure. */
afterEach(() => {
  cleanup();
  const complaints = [...vi.mocked(console.error).mock.calls, ...vi.mocked(console.warn).mock.calls];
  vi.restoreAllMocks();
  vi.unstubAllGlobals();
  localStorage.clear();
  expect(complaints).toEqual([]);
});

export function renderScreen(ui: ReactNode, at = '/') {
  const client = createQueryClient();
  client.setDefaultOptions({ queries: { retry: false } });
  return {
    client,
    ...render(
      <QueryClientProvider client={client}>
        <MemoryRouter initialEntries={[at]}>{ui}</MemoryRouter>
      </QueryClientProvider>,
    ),
  };
}

export function problemText(code: ProblemCode, detail: string, errors?: FieldError[]): string {
  const { status, title } = problems[code];
  return JSON.stringify({ type: `https://example.org/${code}`, title, status, detail, code, errors });
}

/** Answers every fetch with this problem; gives the requests that were made. */
export function refuseEveryCall(code: ProblemCode, detail: string, errors?: FieldError[]) {
  const fake = vi.fn(async (_url: string, _init?: RequestInit) => {
    return new Response(problemText(code, detail, errors), {
      status: problems[code].status,
      headers: { 'content-type': 'application/problem+json' },
    });
  });
  vi.stubGlobal('fetch', fake);
  return fake;
}
