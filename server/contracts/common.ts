import { z } from 'zod';

const typeWords: Record<string, string> = {
  string: 'text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  object: 'an object',
  array: 'a list',
};

// What a schema does not say in its own words is said in these; the path tells which field is meant.
z.config({
  customError: (issue) => {
    if (issue.code === 'invalid_type') {
      if (issue.input === undefined) return 'This is missing.';
      return `This must be ${typeWords[issue.expected] ?? issue.expected}.`;
    }
    if (issue.code === 'unrecognized_keys') {
      return `There is no field ${issue.keys.join(', ')} here; take it out.`;
    }
    return undefined;
  },
});

/** A number between two bounds, with one sentence that says which numbers are accepted. */
export function quantity(what: string, min: number, max: number, unit: string) {
  const sentence = `${what} must be a number from ${min} to ${max}${unit === '' ? '' : ` ${unit}`}.`;
  return z.number({ error: sentence }).min(min, sentence).max(max, sentence);
}

/** Trimmed text of bounded length without control characters or halves of characters. */
export function line(what: string, max: number, min = 1) {
  return z
    .string({ error: `${what} must be text.` })
    .trim()
    .min(min, min === 1 ? `${what} is missing.` : `${what} needs at least ${min} characters.`)
    .max(max, `${what} is longer than ${max} characters; shorten it.`)
    .refine(
      (text) => !/[\p{Cc}\p{Cs}]/u.test(text),
      `${what} contains control characters; remove them.`,
    );
}

/** Upper and lower case letters mean the same in an e-mail address here: it is kept in lower case. */
export const emailSchema = z
  .string({ error: 'The e-mail address must be text.' })
  .trim()
  .toLowerCase()
  .max(254, 'The e-mail address is longer than 254 characters.')
  .pipe(z.email('Enter an e-mail address like name@example.org.'));

export const moneySchema = z.object({ amount: z.int(), currency: z.string().length(3) });
export type Money = z.infer<typeof moneySchema>;

export const pageQuerySchema = z.object({
  page: z.coerce
    .number({ error: 'page must be a whole number from 1.' })
    .int()
    .min(1)
    .max(100_000)
    .default(1),
  pageSize: z.coerce
    .number({ error: 'pageSize must be a whole number from 1 to 500.' })
    .int()
    .min(1)
    .max(500)
    .default(50),
});

export interface Page<Item> {
  items: Item[];
  page: number;
  pageSize: number;
  total: number;
}

/** The list envelope every paged call answers with. */
export function pageOf<Item extends z.ZodType>(item: Item) {
  return z.object({
    items: z.array(item),
    page: z.int(),
    pageSize: z.int(),
    total: z.int(),
  });
}

export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  detail: z.string(),
  errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
});
export type Problem = z.infer<typeof problemSchema>;

export const timestampSchema = z.string();

export const mountingSchema = z.enum(['through-hole', 'surface-mount'], {
  error: 'Mounting must be "through-hole" or "surface-mount".',
});
export type Mounting = z.infer<typeof mountingSchema>;
