import { html, page, type Html } from '../stand-in-look/html.ts';
import type { CaughtMail } from './mail-box.ts';

const note = html`<p class="stand-in">
  <strong>This is a stand-in for a mail server.</strong> Mails are caught here and go nowhere.
</p>`;

export function listPage(mails: CaughtMail[]): string {
  return page(
    'Caught mail',
    html`${note}
      <div class="top">
        <div>
          <h1>Caught mail</h1>
          <p class="soft">${countText(mails.length)}</p>
        </div>
        ${
          mails.length > 0 &&
          html`<form method="post" action="/clear">
            <button class="quiet" type="submit">Throw all away</button>
          </form>`
        }
      </div>
      <ol class="ledger" aria-label="Mails, newest first">
        ${mails.map(line)}
      </ol>`,
  );
}

function countText(count: number): string {
  if (count === 0) return 'None yet. Order something, and its confirmation arrives here.';
  return count === 1 ? 'One mail.' : `${count} mails, newest first.`;
}

function line(mail: CaughtMail): Html {
  return html`<li>
    <time class="soft" datetime="${mail.receivedAt}">${timeText(mail.receivedAt)}</time>
    <span><a href="/mails/${mail.id}">${mail.subject}</a><br />to ${mail.to.join(', ')}</span>
  </li>`;
}

function timeText(receivedAt: string): string {
  return `${receivedAt.slice(0, 10)} ${receivedAt.slice(11, 19)} UTC`;
}

export function mailPage(mail: CaughtMail, source: string): string {
  const attachments = mail.attachments.join(', ');
  return page(
    `${mail.subject} – caught mail`,
    html`<p><a href="/">All caught mail</a></p>
      <h1>${mail.subject}</h1>
      <dl class="facts">
        <dt>From</dt>
        <dd>${mail.from}</dd>
        <dt>To</dt>
        <dd>${mail.to.join(', ')}</dd>
        <dt>Caught</dt>
        <dd>${timeText(mail.receivedAt)}</dd>
        ${
          attachments &&
          html`<dt>Attached</dt>
            <dd>${attachments}</dd>`
        }
      </dl>
      ${
        mail.html !== null &&
        html`<section aria-labelledby="as-page">
          <h2 id="as-page">As a page</h2>
          <iframe
            class="letter"
            sandbox="allow-popups allow-popups-to-escape-sandbox"
            src="/mails/${mail.id}/page"
            title="The mail as a page"
          ></iframe>
        </section>`
      }
      <section aria-labelledby="as-text">
        <h2 id="as-text">As text</h2>
        <pre tabindex="0">${mail.text}</pre>
      </section>
      <details>
        <summary>Source</summary>
        <pre tabindex="0">${source}</pre>
      </details>`,
  );
}

export function missingPage(): string {
  return page(
    'No such mail',
    html`<h1>No such mail</h1>
      <p>It may have been thrown away. <a href="/">All caught mail</a></p>`,
  );
}
