import type { z } from 'zod';

const kinds: Record<string, string> = {
  string: 'text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  array: 'a list',
  object: 'a group of values',
  record: 'a group of values',
};

/** What to say of an issue whose schema brings no sentence of its own; undefined leaves it to zod. */
export function plainSentence(issue: z.core.$ZodRawIssue): string | undefined {
  switch (issue.code) {
    case 'invalid_type':
      return issue.input === undefined
        ? 'This value is missing.'
        : `This must be ${kinds[issue.expected] ?? issue.expected}.`;
    case 'invalid_value':
      return `This must be one of: ${issue.values.map(String).join(', ')}.`;
    case 'too_big':
      return `This must be at most ${issue.maximum}${issue.origin === 'string' ? ' characters' : ''}.`;
    case 'too_small':
      return `This must be at least ${issue.minimum}${issue.origin === 'string' ? ' characters' : ''}.`;
    case 'invalid_format':
      return issue.format === 'uuid' ? 'This is not an id.' : 'This is not of the right form.';
    case 'custom':
    case 'invalid_element':
    case 'invalid_key':
    case 'invalid_union':
    case 'not_multiple_of':
    case 'unrecognized_keys':
      return undefined;
  }
}
