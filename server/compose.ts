import { systemClock } from './adapters/clock.ts';
import { createPrinter } from './adapters/pdf/printer.ts';
import { createSigner } from './adapters/signer.ts';
import { createStripePayments } from './adapters/stripe-payments.ts';
import type { Config } from './config.ts';
import type { Deps } from './ports.ts';
import { openDatabase } from './store/connection.ts';

/** Puts the real adapters together as the environment says. */
export function composeDeps(config: Config): Deps {
  return {
    db: openDatabase(config.databaseUrl),
    clock: systemClock,
    payments: createStripePayments(config.stripe),
    signer: createSigner(config.tokenSecret),
    printer: createPrinter(),
    publicUrl: config.publicUrl,
    demo: config.demo,
    mailPageUrl: config.mailPageUrl,
  };
}
