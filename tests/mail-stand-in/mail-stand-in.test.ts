import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import nodemailer from 'nodemailer';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { createMailStandIn, type MailStandIn } from '../../server/mail-stand-in/mail-stand-in.ts';

let folder: string;
let standIn: MailStandIn;
let addresses: { smtpUrl: string; pageUrl: string };

async function open() {
  standIn = createMailStandIn({ folder, capacity: 3 });
  addresses = await standIn.listen();
}
beforeEach(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'tockwell-mail-'));
  await open();
});
afterEach(async () => {
  await standIn.close();
  rmSync(folder, { recursive: true });
});

async function send(subject: string, html?: string) {
  const transport = nodemailer.createTransport(addresses.smtpUrl);
  await transport.sendMail({
    from: 'Tockwell <shop@tockwell.example>',
    to: 'ada@maker.example',
    subject,
    text: `About ${subject}: R4 = 887 kΩ`,
    html,
    attachments: [{ filename: 'build-sheet.pdf', content: Buffer.from('%PDF-1.4') }],
  });
  transport.close();
}
const page = async (place: string) => (await fetch(addresses.pageUrl + place)).text();

describe('the mail stand-in', () => {
  describe('when a mail is sent to it', () => {
    it('lists it as JSON with what it says', async () => {
      await send('Order TW-1001', '<p>887 kΩ</p>');
      expect(await (await fetch(`${addresses.pageUrl}/api/mails`)).json()).toEqual([
        expect.objectContaining({
          to: ['ada@maker.example'],
          from: expect.stringContaining('shop@tockwell.example') as string,
          subject: 'Order TW-1001',
          text: expect.stringContaining('R4 = 887 kΩ') as string,
          html: '<p>887 kΩ</p>',
          attachments: ['build-sheet.pdf'],
        }),
      ]);
    });

    it('shows text and source, and the HTML in a frame that can run nothing', async () => {
      await send('Order <1001>', '<script>alert(1)</script><p>Hello</p>');
      const [mail] = standIn.mails();
      const shown = await page(`/mails/${mail?.id}`);
      expect(shown).toContain('Order &lt;1001&gt;');
      expect(shown).toContain('sandbox="allow-popups');
      expect(shown).not.toContain('<script>');
      const letter = await fetch(`${addresses.pageUrl}/mails/${mail?.id}/page`);
      expect(letter.headers.get('content-security-policy')).toMatch(
        /^sandbox .*default-src 'none'/,
      );
      expect(await page('/')).toContain('Order &lt;1001&gt;');
    });
  });

  describe('when more arrive than it keeps', () => {
    it('drops the oldest, files included', async () => {
      for (const subject of ['one', 'two', 'three', 'four']) await send(subject);
      expect(standIn.mails().map((mail) => mail.subject)).toEqual(['four', 'three', 'two']);
      expect(readdirSync(folder)).toHaveLength(6);
    });
  });

  describe('when it is started anew', () => {
    it('still has the mails, newest first', async () => {
      await send('one');
      await send('two');
      await standIn.close();
      await open();
      expect(standIn.mails().map((mail) => mail.subject)).toEqual(['two', 'one']);
      expect(await page(`/mails/${standIn.mails()[0]?.id}`)).toContain('Subject: two');
    });
  });

  describe('when it is cleared', () => {
    it('has none, in memory and on disk', async () => {
      await send('one');
      await fetch(`${addresses.pageUrl}/api/mails`, { method: 'DELETE' });
      expect(standIn.mails()).toEqual([]);
      expect(readdirSync(folder)).toEqual([]);
      expect(await page('/')).toContain('None yet');
    });
  });
});
