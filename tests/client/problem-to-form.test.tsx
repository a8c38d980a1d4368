import { describe, expect, it } from 'vitest';
import { ApiProblem, readProblem } from '#src/lib/problem.ts';
import { fieldOfPointer, problemToForm } from '#src/lib/problem-to-form.ts';

describe('a problem in a form', () => {
  it('reads an RFC 6901 pointer as the path of a field, with its two escapes', () => {
    expect(fieldOfPointer('#/limits/width/lower')).toBe('limits.width.lower');
    expect(fieldOfPointer('#/a~1b/c~0d')).toBe('a/b.c~d');
    expect(fieldOfPointer('#')).toBe('');
  });

  it('puts each sentence at its field, focuses the first and returns those without one', () => {
    const problem = new ApiProblem('invalid-input', 422, 'Some values need a correction', '3 values', [
      { pointer: '#/hidden', detail: 'No field shows this.' },
      { pointer: '#/title', detail: 'Enter a title.' },
      { pointer: '#/drawing/aperture/values/width', detail: 'Enter the width.' },
    ]);
    const set: unknown[] = [];
    const more = problemToForm(
      problem,
      { setError: (...args: unknown[]) => void set.push(args) },
      (path) => path === 'title' || path.startsWith('drawing.'),
    );
    expect(more).toEqual(['No field shows this.']);
    expect(set).toEqual([
      ['title', { type: 'server', message: 'Enter a title.' }, { shouldFocus: true }],
      [
        'drawing.aperture.values.width',
        { type: 'server', message: 'Enter the width.' },
        { shouldFocus: false },
      ],
    ]);
  });

  it('is a clear sentence too where the answer is no problem document', () => {
    expect(readProblem(500, '<html>').message).toMatch(/Load the page again/);
    expect(readProblem(502, '<html>').code).toBe('unreachable');
  });
});
