import type { BenchOrder } from '../../../../server/contracts/bench.ts';
import { useShop } from '../../../lib/shop.ts';
import { Tag, TagHead } from '../../../ui/tag.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { BenchFrame } from './bench-frame.tsx';
import { ShipForm } from './ship-form.tsx';
import { WalkLine } from './walk-line.tsx';

/** The bag is closed: the address as it stands on the label, who carries it, and its number. */
export function ShipView({ order }: { order: BenchOrder }) {
  const shop = useShop();
  return (
    <BenchFrame
      order={order}
      place="packed"
      line={<WalkLine picks={order.picks} current={null} end="ship" />}
    >
      <h1 className="py-6 text-[clamp(2rem,5vw,4rem)] leading-[1.1] font-light">
        Packed. Now <strong className="font-heavy">send it</strong>.
      </h1>
      <div className="grid items-start gap-x-10 gap-y-8 md:grid-cols-2">
        <Label order={order} />
        {shop === undefined ? (
          <Waiting words="Asking which carriers come today" />
        ) : (
          <ShipForm orderRef={order.ref} carriers={shop.carriers} />
        )}
      </div>
    </BenchFrame>
  );
}

function Label({ order }: { order: BenchOrder }) {
  return (
    <Tag label={`Label of ${order.ref}`} as="section">
      <TagHead end={<span className="text-soft">{order.ref}</span>}>{order.shippingMethod}</TagHead>
      <address className="px-6 pb-4 text-title leading-snug not-italic">
        {order.address.map((line, index) => (
          <span key={index} className={index === 0 ? 'block font-heavy' : 'block'}>
            {line}
          </span>
        ))}
      </address>
    </Tag>
  );
}
