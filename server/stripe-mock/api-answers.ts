import type { NextFunction, Request, Response } from 'express';
import { ApiError, errorBody, unknownAddress } from './api-error.ts';

/** The last route: no address of the API. */
export function refuseAddress(request: Request): never {
  throw unknownAddress(request.method, request.originalUrl);
}

export function answerError(
  error: unknown,
  _request: Request,
  response: Response,
  next: NextFunction,
): void {
  if (response.headersSent) return next(error);
  const known = error instanceof ApiError ? error : unforeseen(error);
  response.locals.underWay = known.extras.underWay ?? false;
  response.status(known.status).json(errorBody(known));
}

function unforeseen(error: unknown): ApiError {
  const status = (error as { status?: unknown }).status;
  const message = error instanceof Error ? error.message : 'No reason known.';
  return typeof status === 'number' && status < 500
    ? new ApiError(status, 'invalid_request_error', message)
    : new ApiError(500, 'api_error', message, null, null, { underWay: true });
}
