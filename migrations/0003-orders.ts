import type { Knex } from 'knex';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table baskets (
      id uuid primary key default gen_random_uuid(),
      user_id uuid constraint baskets_user_once unique references users (id) on delete cascade,
      guest_key_hash text constraint baskets_guest_once unique,
      updated_at timestamptz not null default now(),
      constraint baskets_one_keeper check (num_nonnulls(user_id, guest_key_hash) = 1)
    );
    create table basket_lines (
      id uuid primary key default gen_random_uuid(),
      basket_id uuid not null references baskets (id) on delete cascade,
      token text not null,
      quantity int not null check (quantity between 1 and 500),
      added_at timestamptz not null default now(),
      constraint basket_lines_token_once unique (basket_id, token)
    );

    create table packs (
      id uuid primary key default gen_random_uuid(),
      identifier text not null constraint packs_identifier_once unique,
      token text not null,
      topology text not null check (topology in ('equal-thresholds', 'shifted-thresholds')),
      sentence text not null,
      brief jsonb not null,
      parts jsonb not null,
      promise jsonb not null,
      cautions jsonb not null,
      strip jsonb not null,
      circuit jsonb not null,
      created_at timestamptz not null default now()
    );
    create trigger packs_frozen before update or delete or truncate on packs
      for each statement execute function refuse_change();

    create sequence order_number start 1041;
    create table orders (
      id bigint generated always as identity primary key,
      ref text not null constraint orders_ref_once unique check (ref ~ '^TQ-[0-9]{4,}$'),
      user_id uuid references users (id),
      basket_id uuid references baskets (id) on delete set null,
      email text not null,
      status text not null check (status in
        ('awaiting_payment', 'paid', 'picking', 'packed', 'shipped', 'on_hold', 'cancelled', 'refunded')),
      ship_to jsonb not null,
      shipping_method text not null,
      shipping_name text not null,
      acknowledgements text[] not null default '{}',
      currency char(3) not null check (currency = 'EUR'),
      goods_minor int not null check (goods_minor >= 0),
      shipping_minor int not null check (shipping_minor >= 0),
      tax_basis_points int not null check (tax_basis_points between 0 and 5000),
      tax_minor int not null check (tax_minor >= 0),
      total_minor int not null,
      reserved_until timestamptz,
      ship_by timestamptz,
      claimed_by uuid references users (id),
      claimed_at timestamptz,
      placed_at timestamptz not null,
      paid_at timestamptz,
      constraint orders_total_adds_up check (total_minor = goods_minor + shipping_minor),
      constraint orders_tax_within_total check (tax_minor <= total_minor),
      constraint orders_picking_is_claimed check (status <> 'picking' or claimed_by is not null),
      constraint orders_waiting_has_end check (status <> 'awaiting_payment' or reserved_until is not null)
    );
    create index orders_by_status on orders (status, ship_by);
    create index orders_by_user on orders (user_id, placed_at desc);
    create index orders_by_placed on orders (placed_at desc);
    create index orders_by_reservation_end on orders (reserved_until) where status = 'awaiting_payment';

    create table order_lines (
      id uuid primary key default gen_random_uuid(),
      order_id bigint not null references orders (id),
      line_no int not null check (line_no > 0),
      pack_id uuid not null references packs (id),
      quantity int not null check (quantity between 1 and 500),
      unit_gross_minor int not null check (unit_gross_minor >= 0),
      line_gross_minor int not null,
      line_tax_minor int not null check (line_tax_minor between 0 and line_gross_minor),
      constraint order_lines_number_once unique (order_id, line_no),
      constraint order_lines_add_up check (line_gross_minor = unit_gross_minor * quantity)
    );
    create table order_parts (
      id bigint generated always as identity primary key,
      order_line_id uuid not null references order_lines (id),
      role text not null,
      part_id int not null references parts (id),
      quantity int not null check (quantity > 0),
      constraint order_parts_role_once unique (order_line_id, role)
    );
    create index order_parts_by_part on order_parts (part_id);

    create table order_events (
      id bigint generated always as identity primary key,
      order_id bigint not null references orders (id),
      at timestamptz not null,
      who text not null,
      what text not null,
      from_status text,
      to_status text
    );
    create index order_events_by_order on order_events (order_id, id);
    create trigger order_events_append_only before update or delete or truncate on order_events
      for each statement execute function refuse_change();

    create table shipments (
      id bigint generated always as identity primary key,
      order_id bigint not null constraint shipments_order_once unique references orders (id),
      carrier text not null check (carrier <> ''),
      tracking text not null check (tracking <> ''),
      shipped_at timestamptz not null,
      shipped_by uuid references users (id)
    );
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table shipments, order_events, order_parts, order_lines, orders, packs, basket_lines, baskets;
    drop sequence order_number;
  `);
}
