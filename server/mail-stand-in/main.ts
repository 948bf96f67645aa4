import { createMailStandIn } from './mail-stand-in.ts';

function portOf(name: string): number {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is not set; the mail stand-in needs it.`);
  return Number(new URL(value).port);
}

const folder = process.env.MAIL_FOLDER;
const standIn = createMailStandIn(folder ? { folder } : {});
const ports = { smtp: portOf('SMTP_URL'), page: portOf('MAIL_PAGE_URL') };
const { pageUrl } = await standIn.listen(ports);
process.stdout.write(`The mail stand-in shows caught mail at ${pageUrl}\n`);

for (const signal of ['SIGTERM', 'SIGINT'] as const) {
  process.on(signal, () => void standIn.close().then(() => process.exit(0)));
}
