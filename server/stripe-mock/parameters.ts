import { z } from 'zod';
import { invalidRequest } from './api-error.ts';

// Form bodies carry text only, so numbers arrive as digits.
export const integer = z
  .string()
  .regex(/^-?\d+$/)
  .transform(Number);
export const metadata = z
  .record(z.string().max(40), z.string().max(500))
  .refine((value) => Object.keys(value).length <= 50, { error: 'at most 50 keys' });
export const expand = z.array(z.string()).max(20).optional();
export const flag = z.enum(['true', 'false']).transform((value) => value === 'true');
export const currency = z
  .string()
  .regex(/^[a-zA-Z]{3}$/)
  .toLowerCase();
const url = z.url({ protocol: /^https?$/ });

const lineItem = z.strictObject({
  quantity: integer.pipe(z.number().int().min(1).max(999_999)),
  price_data: z.strictObject({
    currency,
    unit_amount: integer.pipe(z.number().int().min(0).max(99_999_999)),
    product_data: z.strictObject({
      name: z.string().min(1).max(250),
      description: z.string().min(1).max(1000).optional(),
      metadata: metadata.optional(),
    }),
  }),
});

export const sessionParameters = z.strictObject({
  mode: z.literal('payment'),
  ui_mode: z.literal('hosted_page').optional(),
  success_url: url,
  cancel_url: url.optional(),
  customer_email: z.email().max(800).optional(),
  client_reference_id: z.string().max(200).optional(),
  line_items: z.array(lineItem).min(1).max(100),
  metadata: metadata.optional(),
  payment_intent_data: z
    .strictObject({ metadata: metadata.optional(), description: z.string().max(1000).optional() })
    .optional(),
  expires_at: integer.optional(),
  locale: z.string().optional(),
  expand,
});
export type SessionParameters = z.infer<typeof sessionParameters>;

export const refundParameters = z.strictObject({
  payment_intent: z.string().optional(),
  charge: z.string().optional(),
  amount: integer.optional(),
  reason: z.enum(['duplicate', 'fraudulent', 'requested_by_customer']).optional(),
  metadata: metadata.optional(),
  expand,
});
export type RefundParameters = z.infer<typeof refundParameters>;

export const listParameters = z.strictObject({
  limit: integer.pipe(z.number().int().min(1).max(100)).default(10),
  starting_after: z.string().optional(),
  payment_intent: z.string().optional(),
  charge: z.string().optional(),
  type: z.string().optional(),
  expand,
});

/** Reads a form body by its schema; the first thing wrong with it is the API's error. */
export function readParameters<Output>(schema: z.ZodType<Output>, body: unknown): Output {
  const outcome = schema.safeParse(body ?? {});
  if (outcome.success) return outcome.data;
  throw firstFault(outcome.error.issues[0]);
}

function firstFault(issue: z.core.$ZodIssue | undefined) {
  const param = bracketed(issue?.path ?? []);
  if (issue?.code === 'unrecognized_keys') {
    const unknown = bracketed([...issue.path, issue.keys[0] ?? '']);
    return invalidRequest(`Received unknown parameter: ${unknown}`, 'parameter_unknown', unknown);
  }
  if (issue?.code === 'invalid_type' && issue.input === undefined) {
    return invalidRequest(`Missing required param: ${param}.`, 'parameter_missing', param);
  }
  const code = issue?.code === 'invalid_format' && /\\d/.test(issue.pattern ?? '');
  return invalidRequest(
    `Invalid value for ${param}: ${issue?.message ?? 'not understood'}.`,
    code ? 'parameter_invalid_integer' : null,
    param,
  );
}

/** ['line_items', 0, 'quantity'] → line_items[0][quantity] */
function bracketed(path: readonly PropertyKey[]): string {
  const [first = '', ...rest] = path.map(String);
  return first + rest.map((part) => `[${part}]`).join('');
}
