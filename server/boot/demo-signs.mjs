import { say } from './step.mjs';

const password = 'merrow-quay-demo';
const people = ['maker', 'packer', 'owner'];

/** The line that says the shop is open, then who can sign in, and where mail is caught. */
export function tellReady(url, env) {
  say(`Tockwell is ready at ${url}`);
  if (env.NODE_ENV !== 'production' || env.DEMO === '1') {
    const addresses = people.map((name) => `${name}@tockwell.example`).join(', ');
    say(`  Demo sign-ins: ${addresses} – password ${password}`);
  }
  if (env.MAIL_PAGE_URL) say(`  Mail is caught, not sent; read it at ${env.MAIL_PAGE_URL}`);
  if (env.STRIPE_API_URL) say('  Payments go to a stand-in; no money moves.');
}
