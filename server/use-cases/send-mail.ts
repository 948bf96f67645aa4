import type { Deps, MailSender } from '../ports.ts';
import { lockWaitingMail, markSent, noteMailFailure } from '../store/mail-outbox.ts';
import { inTransaction } from '../store/transaction.ts';

/**
 * Sends one mail from the outbox. The row stays locked while it is sent, so two processes never send
 * it twice; a failure is noted and thrown, and the queue tries again later.
 */
export async function sendMail(
  deps: Pick<Deps, 'db' | 'clock'> & { mail: MailSender },
  outboxId: number,
): Promise<void> {
  try {
    await inTransaction(deps.db, async (trx) => {
      const mail = await lockWaitingMail(trx, outboxId);
      if (mail === null) return;
      await deps.mail.send({
        key: mail.messageKey,
        to: mail.recipient,
        subject: mail.subject,
        text: mail.text,
        html: mail.html,
      });
      await markSent(trx, outboxId, deps.clock.now());
    });
  } catch (error) {
    await noteMailFailure(
      deps.db,
      outboxId,
      error instanceof Error ? error.message : String(error),
    );
    throw error;
  }
}
