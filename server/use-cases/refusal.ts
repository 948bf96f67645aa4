import type { ProblemKind } from '../contracts/error-codes.ts';

/** A request that cannot be granted, with a sentence that says what to change. Becomes a problem answer. */
export class Refusal extends Error {
  override name = 'Refusal';
  readonly kind: ProblemKind;
  readonly errors: { path: string; message: string }[] | undefined;

  constructor(kind: ProblemKind, detail: string, errors?: { path: string; message: string }[]) {
    super(detail);
    this.kind = kind;
    this.errors = errors;
  }
}
