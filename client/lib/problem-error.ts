import { problemKinds } from '../../server/contracts/error-codes.ts';
import type { ProblemKind } from '../../server/contracts/error-codes.ts';
import type { Problem } from '../../server/contracts/common.ts';

function kindOf(problem: Problem): ProblemKind | 'unknown' {
  const last = problem.type.split('/').at(-1) ?? '';
  return Object.hasOwn(problemKinds, last) ? (last as ProblemKind) : 'unknown';
}

/** What the server refused, with its own sentence and the fields it names. */
export class ProblemError extends Error {
  readonly kind: ProblemKind | 'unknown';
  readonly status: number;
  readonly title: string;
  readonly detail: string;
  readonly fields: { path: string; message: string }[];

  constructor(problem: Problem) {
    super(problem.detail === '' ? problem.title : problem.detail);
    this.name = 'ProblemError';
    this.kind = kindOf(problem);
    this.status = problem.status;
    this.title = problem.title;
    this.detail = problem.detail;
    this.fields = problem.errors ?? [];
  }
}

/** The request never got an answer that could be read. */
export class ConnectionError extends Error {
  constructor(sentence = 'The shop did not answer. Check the connection and try again.') {
    super(sentence);
    this.name = 'ConnectionError';
  }
}

export function isProblem(error: unknown, kind?: ProblemKind): error is ProblemError {
  return error instanceof ProblemError && (kind === undefined || error.kind === kind);
}

/** Whether what was asked must change; anything else may be asked again as it is. */
export function isRefusal(problem: ProblemError): boolean {
  return problem.status < 500 && problem.status !== 429 && problem.status !== 408;
}

/** One sentence for a person, whatever went wrong. */
export function sentenceOf(error: unknown): string {
  if (error instanceof ProblemError || error instanceof ConnectionError) return error.message;
  return 'Something broke on this page. Load it again; if it stays, write to us.';
}
