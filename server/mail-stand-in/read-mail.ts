import { simpleParser, type AddressObject } from 'mailparser';
import type { CaughtMail } from './mail-box.ts';

/** Reads a mail as sent (RFC 5322 with MIME) into what the stand-in shows. */
export async function readMail(
  source: string,
  recipients: string[],
  id: string,
  receivedAt: Date,
): Promise<CaughtMail> {
  const parsed = await simpleParser(source, { skipImageLinks: true });
  return {
    id,
    from: addressText(parsed.from),
    // Whom the mail server was told to deliver to; a header may name others, or hide some.
    to: recipients,
    subject: parsed.subject ?? '(no subject)',
    text: parsed.text ?? '',
    html: typeof parsed.html === 'string' ? parsed.html : null,
    receivedAt: receivedAt.toISOString(),
    attachments: parsed.attachments.map(({ filename }) => filename ?? 'unnamed'),
  };
}

function addressText(address: AddressObject | undefined): string {
  return address?.text ?? '(nobody)';
}
