/** The last part of a problem's `type` address, with its HTTP status and its short title. */
export const problemKinds = {
  'unreadable-request': { status: 400, title: 'The request could not be read' },
  'bad-signature': { status: 400, title: 'The signature does not match' },
  'not-signed-in': { status: 401, title: 'Sign in first' },
  'wrong-credentials': { status: 401, title: 'E-mail and password do not match' },
  'not-allowed': { status: 403, title: 'Not allowed' },
  'not-found': { status: 404, title: 'Nothing here' },
  'method-not-allowed': { status: 405, title: 'Not a call of this address' },
  conflict: { status: 409, title: 'Something changed in the meantime' },
  'out-of-stock': { status: 409, title: 'Not enough on the shelf' },
  'basket-empty': { status: 409, title: 'The basket is empty' },
  'basket-changed': { status: 409, title: 'The basket changed' },
  'already-claimed': { status: 409, title: 'Somebody else has this order' },
  'wrong-state': { status: 409, title: 'The order is not in a state for that' },
  'idempotency-mismatch': { status: 409, title: 'This key was used for another request' },
  'too-large': { status: 413, title: 'The request is too large' },
  'unsupported-type': { status: 415, title: 'Send JSON' },
  invalid: { status: 422, title: 'Some fields need a change' },
  'no-oscillation': { status: 422, title: 'This circuit does not oscillate' },
  'impossible-brief': { status: 422, title: 'No circuit can do this' },
  'acknowledgement-missing': { status: 422, title: 'A caution must be acknowledged' },
  'payment-refused': { status: 502, title: 'The payment service did not accept this' },
  'too-many-requests': { status: 429, title: 'Too many requests' },
  'server-error': { status: 500, title: 'Something broke on our side' },
  'not-ready': { status: 503, title: 'Not ready yet' },
} as const;

export type ProblemKind = keyof typeof problemKinds;
