import { usePageTitle } from '../../lib/use-page-title.ts';
import { Opening, Page } from '../../ui/page.tsx';
import { Chapter } from '../../ui/prose.tsx';

export function Component() {
  usePageTitle('Privacy');
  return (
    <Page>
      <Opening>
        We keep <strong>what an order needs</strong>, and nothing for advertising.
      </Opening>
      <Chapter id="kept" title="What is kept">
        <p>
          Your e-mail, name and address for as long as the order’s records must be kept; your
          account’s name and a scrambled form of its password until you close it; the rates people
          ask for, without their names, so that the owner knows which parts are missing.
        </p>
        <p>This is a demonstration shop: please use an invented name and address.</p>
      </Chapter>
      <Chapter id="cards" title="Cards">
        <p>
          Card numbers are typed on the payment service’s own page and never reach this shop. The
          demonstration uses a stand-in that takes no real cards.
        </p>
      </Chapter>
      <Chapter id="cookies" title="Cookies and storage">
        <p>
          Cookies keep your basket and your sign-in, and that is all. This browser also remembers
          whether you chose day light or the night bench, and which steps of a build sheet you
          ticked; neither leaves it.
        </p>
      </Chapter>
      <Chapter id="yours" title="Your data">
        <p>
          Write to the address at the foot of the page for a copy of what is kept about you, or to
          have it erased.
        </p>
      </Chapter>
    </Page>
  );
}
