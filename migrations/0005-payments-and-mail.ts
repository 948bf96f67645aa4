import type { Knex } from 'knex';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table payments (
      id bigint generated always as identity primary key,
      order_id bigint not null references orders (id),
      session_id text not null constraint payments_session_once unique,
      payment_url text not null,
      intent_id text constraint payments_intent_once unique,
      amount_minor int not null check (amount_minor > 0),
      currency char(3) not null check (currency = 'EUR'),
      status text not null check (status in ('open', 'captured', 'expired', 'refunded')),
      created_at timestamptz not null default now(),
      captured_at timestamptz,
      constraint payments_captured_has_intent check (status not in ('captured', 'refunded') or intent_id is not null)
    );
    create index payments_by_order on payments (order_id);

    create table payment_events (
      id text primary key,
      type text not null,
      payload jsonb not null,
      received_at timestamptz not null default now(),
      applied_at timestamptz,
      outcome text
    );

    create table refunds (
      id bigint generated always as identity primary key,
      payment_id bigint not null references payments (id),
      refund_id text constraint refunds_refund_once unique,
      request_key text not null constraint refunds_request_once unique,
      amount_minor int not null check (amount_minor > 0),
      status text not null check (status in ('asked', 'done', 'failed')),
      reason text not null,
      actor_name text not null,
      created_at timestamptz not null default now()
    );
    create index refunds_by_payment on refunds (payment_id);

    create table mail_outbox (
      id bigint generated always as identity primary key,
      message_key text not null constraint mail_outbox_key_once unique,
      order_id bigint references orders (id),
      recipient text not null,
      subject text not null,
      body_text text not null,
      body_html text not null,
      queued_at timestamptz not null default now(),
      sent_at timestamptz,
      attempts int not null default 0,
      last_error text
    );
    create index mail_outbox_waiting on mail_outbox (id) where sent_at is null;

    create table idempotency_keys (
      key text not null,
      scope text not null,
      request_hash text not null,
      status int,
      body jsonb,
      created_at timestamptz not null default now(),
      primary key (scope, key)
    );

    create table settings (
      name text primary key,
      value jsonb not null,
      changed_at timestamptz not null default now()
    );
    create table tax_rates (
      country char(2) primary key,
      name text not null,
      basis_points int not null check (basis_points between 0 and 5000)
    );
    create table shipping_methods (
      code text not null,
      zone text not null check (zone in ('home', 'europe', 'world')),
      name text not null,
      days text not null,
      net_minor int not null check (net_minor >= 0),
      position int not null,
      primary key (code, zone)
    );
    create table shipping_zones (
      country char(2) primary key references tax_rates (country),
      zone text not null check (zone in ('home', 'europe', 'world'))
    );
    create table unserved_briefs (
      id bigint generated always as identity primary key,
      at timestamptz not null default now(),
      brief jsonb not null,
      nearest_error double precision
    );
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table unserved_briefs, shipping_zones, shipping_methods, tax_rates, settings, idempotency_keys,
      mail_outbox, refunds, payment_events, payments;
  `);
}
