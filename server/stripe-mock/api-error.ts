/** An answer of the service's other than success, in the words and codes of its API. */
export class ApiError extends Error {
  override name = 'ApiError';

  constructor(
    readonly status: number,
    readonly type: 'invalid_request_error' | 'idempotency_error' | 'api_error',
    message: string,
    readonly code: string | null = null,
    readonly param: string | null = null,
  ) {
    super(message);
  }
}

export function invalidRequest(message: string, code: string | null = null, param?: string) {
  return new ApiError(400, 'invalid_request_error', message, code, param ?? null);
}

export function missingResource(kind: string, id: string) {
  const message = `No such ${kind}: '${id}'`;
  return new ApiError(404, 'invalid_request_error', message, 'resource_missing', 'id');
}

/** The JSON body an error is sent as. */
export function errorBody(error: ApiError) {
  const { type, message, code, param } = error;
  return { error: { type, message, ...(code && { code }), ...(param && { param }) } };
}
