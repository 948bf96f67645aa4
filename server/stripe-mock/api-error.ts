import type Stripe from 'stripe';

type ErrorType = 'invalid_request_error' | 'idempotency_error' | 'card_error' | 'api_error';

interface ErrorExtras {
  declineCode?: string;
  intent?: Stripe.PaymentIntent;
  /** Whether the request was under way when it was refused: only then its key keeps the answer. */
  underWay?: boolean;
}

/** An answer of the service's other than success, in the words and codes of its API. */
export class ApiError extends Error {
  override name = 'ApiError';

  constructor(
    readonly status: number,
    readonly type: ErrorType,
    message: string,
    readonly code: string | null = null,
    readonly param: string | null = null,
    readonly extras: ErrorExtras = {},
  ) {
    super(message);
  }
}

/** A request that is wrong in itself. */
export function invalidRequest(message: string, code: string | null = null, param?: string) {
  return new ApiError(400, 'invalid_request_error', message, code, param ?? null);
}

/** A request that is right in itself, but not in the state things are in. */
export function refused(message: string, code: string | null = null, param?: string) {
  return new ApiError(400, 'invalid_request_error', message, code, param ?? null, {
    underWay: true,
  });
}

/** A step that the state of a payment intent does not allow. */
export function unexpectedState(message: string, intent: Stripe.PaymentIntent) {
  const code = 'payment_intent_unexpected_state';
  const extras = { intent: structuredClone(intent), underWay: true };
  return new ApiError(400, 'invalid_request_error', message, code, null, extras);
}

/** The bank's no: 402, with the intent as the attempt left it. */
export function cardDeclined(intent: Stripe.PaymentIntent, declineCode: string, message: string) {
  const extras = { declineCode, intent: structuredClone(intent), underWay: true };
  return new ApiError(402, 'card_error', message, 'card_declined', null, extras);
}

export function missingResource(kind: string, id: string, param = 'id') {
  const message = `No such ${kind}: '${id}'`;
  return new ApiError(404, 'invalid_request_error', message, 'resource_missing', param);
}

export function unknownAddress(method: string, url: string) {
  const message = `Unrecognized request URL (${method}: ${url}).`;
  return new ApiError(404, 'invalid_request_error', message);
}

/** The JSON body an error is sent as. */
export function errorBody(error: ApiError) {
  const { type, message, code, param } = error;
  const { declineCode, intent } = error.extras;
  return {
    error: {
      type,
      message,
      ...(code && { code }),
      ...(param && { param }),
      ...(declineCode && { decline_code: declineCode }),
      ...(intent && { payment_intent: intent }),
    },
  };
}
