import type { ZodError } from 'zod';

export interface FieldError {
  path: string;
  message: string;
}

type Issue = ZodError['issues'][number];

const shown = 20;

/** The wrong fields of a request, each with a sentence that says what to change. */
export function fieldErrors(error: ZodError): FieldError[] {
  return error.issues.slice(0, shown).map((issue) => {
    const path = issue.path.map(String).join('.');
    return { path, message: sentenceFor(issue) };
  });
}

/** The contract's own sentence; where it has none, one made from what was expected. */
function sentenceFor(issue: Issue): string {
  if (!/^(Invalid|Too)/.test(issue.message)) return issue.message;
  switch (issue.code) {
    case 'invalid_value':
      return `This must be one of ${issue.values.map(String).join(', ')}.`;
    case 'too_small':
      return `This must be at least ${issue.minimum}.`;
    case 'too_big':
      return `This must be at most ${issue.maximum}.`;
    default:
      return 'This is not as described; check it.';
  }
}
