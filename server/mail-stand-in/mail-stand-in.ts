import { randomBytes } from 'node:crypto';
import { createServer, type Server } from 'node:http';
import type { AddressInfo, Server as NetServer } from 'node:net';
import { text } from 'node:stream/consumers';
import { SMTPServer } from 'smtp-server';
import { createMailApp } from './mail-app.ts';
import { MailBox, type CaughtMail } from './mail-box.ts';
import { readMail } from './read-mail.ts';

export interface MailStandInSettings {
  /** Where mails are kept over a restart; in memory only when left out. */
  folder?: string;
  /** How many mails are kept; the oldest go first. */
  capacity?: number;
}

export interface MailStandIn {
  /** Caught mails, newest first. */
  mails(): CaughtMail[];
  clear(): void;
  /** Listens on loopback; answers both addresses. */
  listen(ports?: { smtp?: number; page?: number }): Promise<{ smtpUrl: string; pageUrl: string }>;
  close(): Promise<void>;
}

const loopback = '127.0.0.1';
const largestMailBytes = 20_000_000;

/** A mail server that catches every mail and shows it, instead of sending it on. */
export function createMailStandIn({
  folder,
  capacity = 500,
}: MailStandInSettings = {}): MailStandIn {
  const box = new MailBox(folder ?? null, capacity);
  const smtp = smtpServer(box);
  const web = createServer(createMailApp(box));
  return {
    mails: () => box.list(),
    clear: () => box.clear(),
    async listen({ smtp: smtpPort = 0, page: pagePort = 0 } = {}) {
      const smtpUrl = `smtp://${loopback}:${await listening(smtp.server, smtpPort)}`;
      return { smtpUrl, pageUrl: `http://${loopback}:${await listening(web, pagePort)}` };
    },
    async close() {
      web.closeAllConnections();
      await new Promise((done) => web.close(done));
      await new Promise<void>((done) => smtp.close(done));
    },
  };
}

function smtpServer(box: MailBox): SMTPServer {
  return new SMTPServer({
    // Everything stays on this machine, so neither sign-in nor encryption is asked for.
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    size: largestMailBytes,
    logger: false,
    onData(stream, session, done) {
      const recipients = session.envelope.rcptTo.map(({ address }) => address);
      catchMail(box, stream, recipients).then(
        () => done(),
        (error: unknown) => done(error instanceof Error ? error : new Error('unreadable mail')),
      );
    },
  });
}

async function catchMail(box: MailBox, stream: NodeJS.ReadableStream, recipients: string[]) {
  const source = await text(stream);
  const at = new Date();
  const id = `${at.toISOString().replace(/\D/g, '')}-${randomBytes(3).toString('hex')}`;
  box.add(await readMail(source, recipients, id, at), source);
}

function listening(server: Server | NetServer, port: number): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, loopback, () => resolve((server.address() as AddressInfo).port));
  });
}
