import { solveRequestSchema, type SolveRequestInput } from '../server/contracts/brief.ts';
import type { Deps } from '../server/ports.ts';
import { cancelUnpaidOrder } from '../server/use-cases/cancel-unpaid-order.ts';
import { addToBasket } from '../server/use-cases/change-basket.ts';
import { claimOrder } from '../server/use-cases/claim-order.ts';
import { packOrder } from '../server/use-cases/pack-order.ts';
import { placeOrder } from '../server/use-cases/place-order.ts';
import { refundOrder } from '../server/use-cases/refund-order.ts';
import { settleCheckout } from '../server/use-cases/settle-checkout.ts';
import { shipOrder } from '../server/use-cases/ship-order.ts';
import { solveBrief } from '../server/use-cases/solve-brief.ts';
import { tickPick } from '../server/use-cases/tick-pick.ts';
import { viewBenchOrder } from '../server/use-cases/view-bench-order.ts';

type End =
  | 'awaiting_payment'
  | 'paid'
  | 'picking'
  | 'packed'
  | 'shipped'
  | 'on_hold'
  | 'cancelled'
  | 'refunded';

interface DemoOrder {
  daysAgo: number;
  buyer: {
    name: string;
    email: string;
    line1: string;
    city: string;
    postalCode: string;
    country: string;
  };
  brief: SolveRequestInput;
  kits: number;
  end: End;
}

const fenna = {
  name: 'Fenna Orrick',
  email: 'maker@tockwell.example',
  line1: '14 Tern Row',
  city: 'Merrow Quay',
  postalCode: 'MQ2 7AE',
  country: 'IE',
};
const school = {
  name: 'Sandhollow School, Workshop',
  email: 'workshop@sandhollow.example',
  line1: '2 Chapel Bank',
  city: 'Sandhollow',
  postalCode: '4820',
  country: 'NL',
};
const lab = {
  name: 'Oda Lindqvarn',
  email: 'oda@lindqvarn.example',
  line1: '77 Juniper Yard',
  city: 'Vastmoor',
  postalCode: '118 60',
  country: 'SE',
};
const twoCells = { battery: 'TW-CELL-AA-2' };
const threeCells = { battery: 'TW-CELL-AAA-3' };

/** Orders of the demonstration shop, oldest first: one in every state, so that each screen has life. Invented. */
const demoOrders: DemoOrder[] = [
  {
    daysAgo: 11,
    buyer: fenna,
    kits: 1,
    end: 'shipped',
    brief: { target: { value: 60, unit: 'per_minute' }, supply: twoCells },
  },
  {
    daysAgo: 8,
    buyer: school,
    kits: 12,
    end: 'shipped',
    brief: {
      target: { value: 40, unit: 'per_minute' },
      supply: threeCells,
      load: { kind: 'led', colour: 'green' },
    },
  },
  {
    daysAgo: 6,
    buyer: lab,
    kits: 2,
    end: 'refunded',
    brief: { target: { value: 10, unit: 'kHz' }, load: { kind: 'logic' } },
  },
  {
    daysAgo: 5,
    buyer: lab,
    kits: 1,
    end: 'on_hold',
    brief: { target: { value: 2.5, unit: 's' }, supply: { volts: 9 } },
  },
  {
    daysAgo: 4,
    buyer: fenna,
    kits: 2,
    end: 'shipped',
    brief: { target: { value: 1, unit: 'kHz' }, load: { kind: 'logic' }, supply: { volts: 3.3 } },
  },
  {
    daysAgo: 3,
    buyer: fenna,
    kits: 1,
    end: 'cancelled',
    brief: { target: { value: 120, unit: 'per_minute' }, supply: twoCells },
  },
  {
    daysAgo: 4,
    buyer: school,
    kits: 6,
    end: 'paid',
    brief: {
      target: { value: 75, unit: 'per_minute' },
      supply: threeCells,
      load: { kind: 'led', colour: 'yellow' },
    },
  },
  {
    daysAgo: 1,
    buyer: lab,
    kits: 1,
    end: 'packed',
    brief: {
      target: { value: 4, unit: 'kHz' },
      load: { kind: 'logic' },
      mounting: 'surface-mount',
    },
  },
  {
    daysAgo: 0.2,
    buyer: school,
    kits: 3,
    end: 'picking',
    brief: { target: { value: 5, unit: 's' }, supply: threeCells },
  },
  {
    daysAgo: 0.1,
    buyer: fenna,
    kits: 1,
    end: 'paid',
    brief: { target: { value: 90, unit: 'per_minute' }, supply: twoCells },
  },
  {
    daysAgo: 0.05,
    buyer: lab,
    kits: 4,
    end: 'paid',
    brief: { target: { value: 440, unit: 'Hz' }, load: { kind: 'logic' }, supply: { volts: 5 } },
  },
  {
    daysAgo: 0.005,
    buyer: lab,
    kits: 1,
    end: 'awaiting_payment',
    brief: { target: { value: 0.5, unit: 'Hz' }, supply: { volts: 5 } },
  },
];

/**
 * Places the demonstration orders through the shop's own use cases, paid at the local stand-in, each at
 * its own moment in the past. Does nothing in a shop that has orders, or one without a stand-in.
 */
export async function seedDemoOrders(deps: Deps): Promise<void> {
  if (await deps.db('orders').first('id')) return;
  for (const [k, order] of demoOrders.entries()) await placeDemoOrder(deps, order, k);
}

async function placeDemoOrder(real: Deps, order: DemoOrder, k: number): Promise<void> {
  const deps = atDaysAgo(real, order.daysAgo);
  const solved = await solveBrief(
    deps,
    solveRequestSchema.parse({ ...order.brief, quantity: order.kits }),
  );
  const [pack] = solved.packs;
  if (!pack) return;
  const user = await deps.db('users').where({ email: order.buyer.email }).first('id');
  const keeper = user ? { userId: user.id } : { guestKeyHash: `demonstration-${k}` };
  await addToBasket(deps, keeper, { token: pack.token, quantity: order.kits });
  const { email, ...address } = order.buyer;
  const { orderRef, paymentUrl } = await placeOrder(
    deps,
    { keeper, userId: user?.id ?? null },
    {
      email,
      shippingAddress: address,
      shippingMethod: 'standard',
      acknowledgements: pack.cautions.filter((one) => one.mustAcknowledge).map((one) => one.code),
    },
  );
  await bringTo(deps, order.end, orderRef, paymentUrl);
}

async function bringTo(deps: DemoDeps, end: End, ref: string, paymentUrl: string): Promise<void> {
  if (end === 'awaiting_payment') return;
  if (end === 'cancelled') {
    deps.clock.pass(36);
    await cancelUnpaidOrder(deps, ref, 'Not paid in time');
    return;
  }
  await payAtStandIn(paymentUrl);
  deps.clock.pass(4);
  const payment = await deps
    .db('payments')
    .join('orders', 'orders.id', 'payments.order_id')
    .where('orders.ref', ref)
    .first('session_id');
  await settleCheckout(end === 'on_hold' ? withWrongAmount(deps) : deps, payment.session_id);
  if (end === 'on_hold' || end === 'paid') return;
  if (end === 'refunded') {
    const owner = await staff(deps, 'owner@tockwell.example');
    deps.clock.pass(185);
    await refundOrder(deps, owner, ref, 'Ordered the wrong rate; withdrew before packing');
    return;
  }
  await workBench(deps, end, ref);
}

async function workBench(deps: DemoDeps, end: End, ref: string): Promise<void> {
  const email = end === 'picking' ? 'second-packer@tockwell.example' : 'packer@tockwell.example';
  const packer = await staff(deps, email);
  deps.clock.pass(end === 'picking' ? 40 : 95);
  await claimOrder(deps, packer, ref);
  deps.clock.pass(11);
  const { picks } = await viewBenchOrder(deps, packer, ref);
  const taken = end === 'picking' ? picks.slice(0, 3) : picks;
  for (const pick of taken)
    await tickPick(deps, packer, ref, { id: pick.id, quantity: pick.quantity });
  if (end === 'picking') return;
  await packOrder(deps, packer, ref);
  deps.clock.pass(25);
  if (end === 'shipped') {
    await shipOrder(deps, packer, ref, {
      carrier: 'Quay Post',
      tracking: `QP${ref.slice(3)}7730IE`,
    });
  }
}

async function staff(deps: Deps, email: string): Promise<{ id: string; name: string }> {
  return deps.db('users').where({ email }).first('id', 'name');
}

/** A clock that runs behind the real one and can be moved on between two steps of an order. */
interface DemoClock {
  now(): Date;
  pass(minutes: number): void;
}
type DemoDeps = Deps & { clock: DemoClock };

function clockBehind(real: Deps['clock'], daysAgo: number): DemoClock {
  let behindMs = daysAgo * 86_400_000;
  return {
    now: () => new Date(real.now().getTime() - behindMs),
    pass: (minutes) => {
      behindMs = Math.max(0, behindMs - minutes * 60_000);
    },
  };
}

/** The same shop some days ago; the payment service keeps its own time. */
function atDaysAgo(deps: Deps, daysAgo: number): DemoDeps {
  return {
    ...deps,
    clock: clockBehind(deps.clock, daysAgo),
    payments: {
      ...deps.payments,
      openCheckout: (request) =>
        deps.payments.openCheckout({
          ...request,
          expiresAt: new Date(Math.max(request.expiresAt.getTime(), Date.now() + 35 * 60_000)),
        }),
    },
  };
}

/** As when a payment arrives that is not the order's total. */
function withWrongAmount(deps: Deps): Deps {
  return {
    ...deps,
    payments: {
      ...deps.payments,
      checkoutState: async (sessionId) => {
        const state = await deps.payments.checkoutState(sessionId);
        return { ...state, amountMinor: state.amountMinor - 100 };
      },
    },
  };
}

/** Fills in the stand-in's card page with the test card. */
async function payAtStandIn(paymentUrl: string): Promise<void> {
  const form = new URLSearchParams({
    number: '4242424242424242',
    expiry: '12/40',
    code: '123',
    name: 'Demo',
  });
  await fetch(paymentUrl, { method: 'POST', body: form, redirect: 'manual' });
}
