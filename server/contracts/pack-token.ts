import { z } from 'zod';

export const packTokenVersion = 1;

const number = z.number();
/** What a sealed pack token holds: version, join, role and part pairs, the brief's fields. */
export const packTokenSchema = z.tuple([
  z.literal(packTokenVersion),
  z.union([z.literal(0), z.literal(1), z.literal(2)]),
  z.array(z.int().min(0)),
  z.tuple([
    number,
    number,
    number,
    z.union([number, z.string()]),
    z.union([number, z.tuple([number, number])]),
    number,
    number,
    number,
    number,
    number,
    number,
  ]),
]);
export type PackTokenFields = z.output<typeof packTokenSchema>[3];
