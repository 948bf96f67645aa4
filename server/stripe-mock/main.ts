import { createStripeMock } from './stripe-mock.ts';

function required(name: string): string {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is not set; the payment stand-in needs it.`);
  return value;
}

const stateFile = process.env.STRIPE_MOCK_STATE;
const mock = createStripeMock({
  secretKey: required('STRIPE_SECRET_KEY'),
  webhookSecret: required('STRIPE_WEBHOOK_SECRET'),
  webhookUrl: process.env.STRIPE_WEBHOOK_URL ?? null,
  ...(stateFile && { stateFile }),
});
const address = await mock.listen(Number(new URL(required('STRIPE_API_URL')).port));
process.stdout.write(`The payment stand-in listens at ${address}\n`);

for (const signal of ['SIGTERM', 'SIGINT'] as const) {
  process.on(signal, () => void mock.close().then(() => process.exit(0)));
}
