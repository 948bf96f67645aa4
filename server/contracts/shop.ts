import { z } from 'zod';
import { ledColours } from './brief.ts';

/** What the forms need to know of the shop before anybody types. */
export const shopSchema = z.object({
  name: z.string(),
  address: z.array(z.string()),
  email: z.string(),
  currency: z.string(),
  demo: z.boolean(),
  /** Page of caught mail while the local mail stand-in is used; null with real mail. */
  mailPageUrl: z.string().nullable(),
  batteries: z.array(
    z.object({ sku: z.string(), label: z.string(), words: z.string(), nominalVolts: z.number() }),
  ),
  ledColours: z.array(z.enum(ledColours)),
  carriers: z.array(z.string()),
});
export type Shop = z.infer<typeof shopSchema>;
