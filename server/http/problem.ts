import type { ErrorRequestHandler, Response } from 'express';
import { ZodError } from 'zod';
import { problemKinds, type ProblemKind } from '../contracts/error-codes.ts';
import { BadSignature } from '../ports.ts';
import { Refusal } from '../use-cases/refusal.ts';
import { fieldErrors, type FieldError } from './field-errors.ts';

/** Answers with problem details (RFC 9457). */
export function sendProblem(
  res: Response,
  kind: ProblemKind,
  detail: string,
  errors?: FieldError[],
): void {
  const { status, title } = problemKinds[kind];
  res
    .status(status)
    .type('application/problem+json')
    .send(
      JSON.stringify({
        type: `/problems/${kind}`,
        title,
        status,
        detail,
        ...(errors && errors.length > 0 ? { errors } : {}),
      }),
    );
}

/** The first fault as a sentence of its own: "target: This is missing." where it names no field itself. */
function detailOf(first: FieldError | undefined): string {
  if (first === undefined) return 'Some fields need a change.';
  if (!first.message.startsWith('This ')) return first.message;
  return first.path === '' ? 'Send a JSON object as the body.' : `${first.path}: ${first.message}`;
}

const bodyProblems: Record<string, [ProblemKind, string]> = {
  'entity.parse.failed': [
    'unreadable-request',
    'The body is not valid JSON; check quotes, commas and brackets.',
  ],
  'entity.too.large': ['too-large', 'The body is larger than 100 kB; send less at once.'],
  'encoding.unsupported': [
    'unsupported-type',
    'Send the body uncompressed or as gzip, deflate or br.',
  ],
  'charset.unsupported': ['unsupported-type', 'Send the body as UTF-8.'],
  'request.aborted': ['unreadable-request', 'The body ended early.'],
  'request.size.invalid': [
    'unreadable-request',
    'The body is not as long as its Content-Length says.',
  ],
  'stream.encoding.set': ['unreadable-request', 'The body could not be read.'],
};

/** The status that a parser or a file server put on its error; 500 where there is none. */
function statusOf(error: unknown): number {
  return error instanceof Error && 'status' in error ? Number(error.status) : 500;
}

/** The one place where errors become answers. What is not foreseen is logged and says nothing of itself. */
export const errorMap: ErrorRequestHandler = (error: unknown, req, res, next) => {
  if (res.headersSent) {
    next(error);
    return;
  }
  if (error instanceof Refusal) return sendProblem(res, error.kind, error.message, error.errors);
  if (error instanceof ZodError) {
    const errors = fieldErrors(error);
    return sendProblem(res, 'invalid', detailOf(errors[0]), errors);
  }
  if (error instanceof BadSignature) return sendProblem(res, 'bad-signature', error.message);
  const type = error instanceof Error && 'type' in error ? String(error.type) : '';
  const known = bodyProblems[type];
  if (known) return sendProblem(res, known[0], known[1]);
  if (error instanceof URIError) {
    return sendProblem(res, 'unreadable-request', 'The address holds a broken escape sequence.');
  }
  if (statusOf(error) === 404) return sendProblem(res, 'not-found', 'There is no such file.');
  if (statusOf(error) >= 400 && statusOf(error) < 500) {
    return sendProblem(res, 'unreadable-request', 'The request could not be read; check its body.');
  }
  req.log?.error({ err: error }, 'unforeseen error');
  return sendProblem(
    res,
    'server-error',
    'Something broke on our side; it was noted. Try again, and write to us if it stays.',
  );
};
