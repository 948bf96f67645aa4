import type { BenchOrder } from '../contracts/bench.ts';
import { addressLines } from '../domain/order-mail.ts';
import { inBillOrder, labelOf, markingOf } from '../domain/pack-parts.ts';
import type { Deps } from '../ports.ts';
import { findOrder, linesOfOrders, partsOfOrder } from '../store/orders.ts';
import { findShipment } from '../store/shipments.ts';
import { findParts } from '../store/parts.ts';
import { countryName, shopSettings } from '../store/settings.ts';
import { picksOfOrder } from '../store/stock.ts';
import { tuningsOfOrder } from '../store/tunings.ts';
import type { Packer } from './bench-order.ts';
import { Refusal } from './refusal.ts';
import { lineTuning, rolesOfPart } from './view-tuning.ts';

/** One order as the bench sees it: the walk in bin order, the lines with their readings, the label. */
export async function viewBenchOrder(
  deps: Pick<Deps, 'db'>,
  packer: Packer,
  ref: string,
): Promise<BenchOrder> {
  const order = await findOrder(deps.db, ref);
  const known = ['paid', 'picking', 'packed', 'shipped'];
  if (order === null || !known.includes(order.status)) {
    throw new Refusal('not-found', `The bench has no order ${ref}.`);
  }
  const [picks, lines, needs, tunings, settings, shipment] = await Promise.all([
    picksOfOrder(deps.db, order.id),
    linesOfOrders(deps.db, [order.id]),
    partsOfOrder(deps.db, order.id),
    tuningsOfOrder(deps.db, order.id),
    shopSettings(deps.db),
    findShipment(deps.db, order.id),
  ]);
  const parts = new Map(
    (
      await findParts(
        deps.db,
        picks.map((pick) => pick.partId),
      )
    ).map((part) => [part.id, part]),
  );
  const inHand = { lines, needs, tunings, picks, parts };
  return {
    ref: order.ref,
    status: order.status,
    shipBy: (order.shipBy ?? order.placedAt).toISOString(),
    claimedBy: order.claimedByName,
    mine: order.claimedBy === packer.id,
    shippingMethod: order.shippingName,
    address: addressLines(order.shipTo, await countryName(deps.db, order.shipTo.country)),
    lines: lines.map((line) => ({
      id: line.id,
      sentence: line.sentence,
      quantity: line.quantity,
      parts: inBillOrder(line.parts),
      cautions: line.cautions.map((caution) => caution.text),
      tuning: lineTuning(line, inHand, settings),
    })),
    picks: picks.map((pick) => {
      const part = parts.get(pick.partId)!;
      return {
        id: String(pick.id),
        bin: pick.bin,
        sku: part.facts.sku,
        lot: pick.lot,
        label: labelOf(part),
        marking: markingOf(part),
        kind: part.kind,
        roles: rolesOfPart(pick.partId, inHand),
        quantity: pick.quantity,
        picked: pick.picked,
      };
    }),
    shipment: shipment && { carrier: shipment.carrier, tracking: shipment.tracking },
  };
}
