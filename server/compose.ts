import { systemClock } from './adapters/clock.ts';
import { createPrinter } from './adapters/pdf/printer.ts';
import { createSigner } from './adapters/signer.ts';
import { createStripePayments } from './adapters/stripe-payments.ts';
import type { Config } from './config.ts';
import type { Deps } from './ports.ts';
import { openDatabase } from './store/connection.ts';
import { createStockView } from './store/stock-view.ts';

/**
 * Puts the real adapters together as the environment says; `close` ends their connections to the
 * database, and `noteLoss` hears of one that broke.
 */
export function composeDeps(
  config: Config,
  noteLoss?: (error: Error) => void,
): Deps & { close(): Promise<void> } {
  const db = openDatabase(config.databaseUrl);
  const stockView = createStockView(config.databaseUrl, db, noteLoss);
  return {
    db,
    stockView,
    clock: systemClock,
    payments: createStripePayments(config.stripe),
    signer: createSigner(config.tokenSecret),
    printer: createPrinter(),
    publicUrl: config.publicUrl,
    demo: config.demo,
    mailPageUrl: config.mailPageUrl,
    async close() {
      await stockView.close();
      await db.destroy();
    },
  };
}
