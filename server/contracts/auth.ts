import { z } from 'zod';
import { emailSchema, line } from './common.ts';

export const roleSchema = z.enum(['customer', 'packer', 'owner']);
export type Role = z.infer<typeof roleSchema>;

/** NIST SP 800-63B-4, 3.1.1.2: 15 characters where the password is the only factor; no rules of composition. */
export const passwordSchema = z
  .string({ error: 'The password must be text.' })
  .refine((text) => [...text.normalize('NFKC')].length >= 15, {
    message: 'Use at least 15 characters; a few words in a row are easy to remember.',
  })
  .refine((text) => [...text].length <= 200, {
    message: 'Use at most 200 characters.',
  });

export const signUpSchema = z.object({
  email: emailSchema,
  password: passwordSchema,
  name: line('The name', 120),
});
export type SignUp = z.infer<typeof signUpSchema>;

export const signInSchema = z.object({
  email: emailSchema,
  password: z
    .string({ error: 'The password must be text.' })
    .min(1, 'The password is missing.')
    .max(1000, 'The password is too long.'),
});
export type SignIn = z.infer<typeof signInSchema>;

export const meSchema = z.object({
  id: z.string(),
  email: z.string(),
  name: z.string(),
  role: roleSchema,
});
export type Me = z.infer<typeof meSchema>;
