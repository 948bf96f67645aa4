import type { ZodError } from 'zod';

export interface FieldError {
  path: string;
  message: string;
}

type Issue = ZodError['issues'][number];

const shown = 20;
const kinds: Record<string, string> = {
  object: 'an object',
  array: 'a list',
  string: 'text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
};

/** The wrong fields of a request, each with a sentence that says what to change. */
export function fieldErrors(error: ZodError): FieldError[] {
  return error.issues.slice(0, shown).map((issue) => {
    const path = issue.path.map(String).join('.');
    return { path, message: sentenceFor(issue, path) };
  });
}

/** The contract's own sentence; where it has none, one made from what was expected. */
function sentenceFor(issue: Issue, path: string): string {
  if (!/^(Invalid|Too|Unrecognized)/.test(issue.message)) return issue.message;
  if (path === '' && issue.code === 'invalid_type') {
    return 'Send a JSON object in the body, with Content-Type: application/json.';
  }
  switch (issue.code) {
    case 'invalid_type': {
      const kind = kinds[issue.expected] ?? issue.expected;
      return issue.message.endsWith('received undefined')
        ? `${path} is missing; give ${kind}.`
        : `${path} must be ${kind}.`;
    }
    case 'invalid_value':
      return `${path} must be one of ${issue.values.map(String).join(', ')}.`;
    case 'too_small':
      return `${path} must be at least ${issue.minimum}.`;
    case 'too_big':
      return `${path} must be at most ${issue.maximum}.`;
    case 'unrecognized_keys':
      return `Leave out ${issue.keys.join(', ')}.`;
    default:
      return `${path === '' ? 'The body' : path} is not as described; check it.`;
  }
}
