import type { Knex } from 'knex';

/** What the bench measured and chose for each kit that is tuned. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table tunings (
      id bigint generated always as identity primary key,
      order_line_id uuid not null references order_lines (id),
      unit int not null check (unit between 1 and 500),
      farads double precision not null check (farads > 0),
      meter_uncertainty double precision not null check (meter_uncertainty >= 0),
      first_part_id int not null references parts (id),
      second_part_id int references parts (id),
      joined text check (joined in ('series', 'parallel')),
      promise jsonb not null,
      circuit jsonb not null,
      -- False once the order was handed back: the capacitor is in its bin again, R4 is still kept.
      stands boolean not null default true,
      tuned_by uuid references users (id),
      tuned_at timestamptz not null,
      constraint tunings_unit_once unique (order_line_id, unit),
      constraint tunings_two_are_joined check ((second_part_id is null) = (joined is null))
    );
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`drop table tunings;`);
}
