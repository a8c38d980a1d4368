import type { FieldPath, FieldValues, UseFormReturn } from 'react-hook-form';
import type { ApiProblem } from '#src/lib/problem.ts';

/** "#/limits/width/lower" → "limits.width.lower" (RFC 6901). */
export function fieldOfPointer(pointer: string): string {
  return pointer
    .replace(/^#?\/?/, '')
    .split('/')
    .map((step) => step.replaceAll('~1', '/').replaceAll('~0', '~'))
    .join('.');
}

/**
 * Puts every error of a problem at its field. `hasField` says which paths the form shows; the sentences of the others are
 * returned for the form's summary. The first field with an error gets the focus.
 */
export function problemToForm<V extends FieldValues>(
  problem: ApiProblem,
  form: Pick<UseFormReturn<V>, 'setError'>,
  hasField: (path: string) => boolean,
): string[] {
  const homeless: string[] = [];
  let focused = false;
  for (const error of problem.errors) {
    const path = fieldOfPointer(error.pointer);
    if (!hasField(path)) {
      homeless.push(error.detail);
      continue;
    }
    form.setError(path as FieldPath<V>, { type: 'server', message: error.detail }, { shouldFocus: !focused });
    focused = true;
  }
  return homeless;
}
