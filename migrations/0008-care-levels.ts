import type { Knex } from 'knex';

/** Fees and the meter's figure that the care levels go by, and packs with steered timing. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    update settings set value = jsonb_build_object(
        'careFeesMinor', jsonb_build_object(
          'as-stocked', 0, 'lot-checked', 60, 'bench-tuned', 240, 'trimmer-fitted', 0),
        'meterUncertainty', 0.0025) || value
      where name = 'shop';
    alter table packs drop constraint packs_topology_check;
    alter table packs add constraint packs_topology_check
      check (topology in ('equal-thresholds', 'shifted-thresholds', 'steered'));
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    update settings set value = value - 'careFeesMinor' - 'meterUncertainty' where name = 'shop';
    alter table packs drop constraint packs_topology_check;
    alter table packs add constraint packs_topology_check
      check (topology in ('equal-thresholds', 'shifted-thresholds'));
  `);
}
