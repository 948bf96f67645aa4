import type { BuildSheet } from '../contracts/orders.ts';
import { expectedReadings } from '../domain/build-readings.ts';
import { buildSteps } from '../domain/build-steps.ts';
import { joinOf } from '../domain/pack-parts.ts';
import { drawSchematic } from '../domain/schematic.ts';
import type { Deps } from '../ports.ts';
import { linesOfOrders, type OrderLineRow } from '../store/orders.ts';
import { Refusal } from './refusal.ts';
import { requireOwnOrder, type OrderReader } from './view-order.ts';

/** The build sheet of one order line, for its buyer. */
export async function viewBuildSheet(
  deps: Pick<Deps, 'db' | 'signer'>,
  reader: OrderReader,
  ref: string,
  lineId: string,
): Promise<BuildSheet> {
  const order = await requireOwnOrder(deps, reader, ref);
  const line = (await linesOfOrders(deps.db, [order.id])).find((one) => one.id === lineId);
  if (!line) throw new Refusal('not-found', `Order ${ref} has no such line.`);
  return buildSheetOf(ref, line);
}

/** Everything a build sheet says, from the frozen pack. */
export function buildSheetOf(ref: string, line: OrderLineRow): BuildSheet {
  const { promise, parts, brief, circuit } = line;
  const { timing } = circuit;
  const rate = `${promise.text.rate} ${promise.text.unit}`;
  const buffered = circuit.load?.buffered === true;
  return {
    ref,
    lineId: line.id,
    kits: line.quantity,
    identifier: line.identifier,
    sentence: line.sentence,
    promise,
    strip: line.strip,
    parts,
    drawing: drawSchematic({
      parts,
      join: joinOf(parts, circuit),
      timingOhms: timing.kind === 'single' ? timing.ohms : null,
      buffered,
      supplyLabel: brief.supply.label,
    }),
    steps: buildSteps({
      parts,
      careLevel: brief.careLevel,
      buffered,
      frequencyHz: promise.frequencyHz,
      rate,
    }),
    readings: expectedReadings(circuit, parts, rate),
    cautions: line.cautions,
  };
}
