import { usePageTitle } from '../../lib/use-page-title.ts';
import { Opening, Page } from '../../ui/page.tsx';
import { Chapter } from '../../ui/prose.tsx';

export function Component() {
  usePageTitle('Terms');
  return (
    <Page>
      <Opening>
        What you and we <strong>agree on</strong> when you order.
      </Opening>
      <Chapter id="demo" title="A demonstration shop">
        <p>
          This shop is a demonstration. Its goods, prices, people and places are invented. No money
          is taken and nothing is sent, so no contract of sale comes about. The texts below say how
          the shop would keep its word if it were open.
        </p>
      </Chapter>
      <Chapter id="promise" title="The promise">
        <p>
          The promise on a pack is frozen when you order it: rate, band, temperature and supply
          range as written there. A kit built by its build sheet that does not keep it is a faulty
          kit; we send another or give the money back, as you choose.
        </p>
      </Chapter>
      <Chapter id="order" title="Order and pay">
        <p>
          With “Order and pay” you order and owe the total shown, with tax and sending. Your parts
          are set aside while you are on the card page. If no payment comes in that time, the order
          lapses and the parts go back on the shelf.
        </p>
      </Chapter>
      <Chapter id="back" title="Sending back">
        <p>
          You may send a kit back within 14 days of getting it and need give no reason. You get the
          price and the cheapest way of sending back within 14 days after that.
        </p>
      </Chapter>
      <Chapter id="use" title="What kits are not for">
        <p>
          Battery or other low voltage only, never the mains. Not for life support, medical, vehicle
          or aviation use or any safety function. Local codes and licensed practice come before
          anything written here.
        </p>
      </Chapter>
    </Page>
  );
}
