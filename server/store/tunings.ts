import type { PackPromise } from '../contracts/packs.ts';
import type { Circuit } from '../engine/circuit.ts';
import type { Database } from './connection.ts';

/** One kit as the bench tuned it. */
export interface Tuning {
  lineId: string;
  /** Number of the kit in its line, from 1. */
  unit: number;
  farads: number;
  meterUncertainty: number;
  firstPartId: number;
  secondPartId: number | null;
  join: 'series' | 'parallel' | null;
  promise: PackPromise;
  circuit: Circuit;
}

export interface TuningRow extends Tuning {
  /** False once the order was handed back: the reading counts no more, the parts are still kept. */
  stands: boolean;
}

/** The tuned kits of an order, in the order of their lines and numbers. */
export async function tuningsOfOrder(db: Database, orderId: number): Promise<TuningRow[]> {
  return db('tunings')
    .join('order_lines', 'order_lines.id', 'tunings.order_line_id')
    .where('order_lines.order_id', orderId)
    .orderBy(['order_lines.line_no', 'tunings.unit'])
    .select({
      lineId: 'tunings.order_line_id',
      unit: 'tunings.unit',
      farads: 'tunings.farads',
      meterUncertainty: 'tunings.meter_uncertainty',
      firstPartId: 'tunings.first_part_id',
      secondPartId: 'tunings.second_part_id',
      join: 'tunings.joined',
      promise: 'tunings.promise',
      circuit: 'tunings.circuit',
      stands: 'tunings.stands',
    });
}

/** Writes down a tuned kit; a kit that was tuned before is written over. */
export async function writeTuning(
  db: Database,
  tuning: Tuning,
  by: { userId: string; at: Date },
): Promise<void> {
  await db('tunings')
    .insert({
      order_line_id: tuning.lineId,
      unit: tuning.unit,
      farads: tuning.farads,
      meter_uncertainty: tuning.meterUncertainty,
      first_part_id: tuning.firstPartId,
      second_part_id: tuning.secondPartId,
      joined: tuning.join,
      promise: JSON.stringify(tuning.promise),
      circuit: JSON.stringify(tuning.circuit),
      stands: true,
      tuned_by: by.userId,
      tuned_at: by.at,
    })
    .onConflict(['order_line_id', 'unit'])
    .merge();
}

/** Lets the readings of an order count no more; which R4 is kept for each kit stays known. */
export async function dropReadings(db: Database, orderId: number): Promise<void> {
  await db('tunings')
    .whereIn('order_line_id', db('order_lines').where({ order_id: orderId }).select('id'))
    .update({ stands: false });
}
