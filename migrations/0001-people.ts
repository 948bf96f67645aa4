import type { Knex } from 'knex';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table users (
      id uuid primary key default gen_random_uuid(),
      email text not null check (email = lower(email) and position('@' in email) > 1),
      name text not null check (name <> ''),
      role text not null default 'customer' check (role in ('customer', 'packer', 'owner')),
      password_hash text not null,
      created_at timestamptz not null default now(),
      deactivated_at timestamptz,
      constraint users_email_once unique (email)
    );

    create table sessions (
      id uuid primary key default gen_random_uuid(),
      user_id uuid not null references users (id) on delete cascade,
      renewal_hash text not null constraint sessions_renewal_once unique,
      previous_renewal_hash text,
      renewed_at timestamptz not null default now(),
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      revoked_at timestamptz,
      check (expires_at > created_at)
    );
    create index sessions_by_user on sessions (user_id);
    create index sessions_by_previous_renewal on sessions (previous_renewal_hash);

    create table sign_in_failures (
      id bigint generated always as identity primary key,
      email text not null,
      address text not null,
      at timestamptz not null default now()
    );
    create index sign_in_failures_by_email on sign_in_failures (email, at);
    create index sign_in_failures_by_address on sign_in_failures (address, at);

    create table audit (
      id bigint generated always as identity primary key,
      at timestamptz not null default now(),
      actor_id uuid references users (id),
      actor_name text not null,
      action text not null,
      subject_kind text not null,
      subject_id text not null,
      before jsonb,
      after jsonb,
      note text
    );
    create index audit_by_subject on audit (subject_kind, subject_id, id);

    create function refuse_change() returns trigger language plpgsql as $$
    begin
      raise exception '% is append-only', tg_table_name using errcode = 'restrict_violation';
    end $$;
    create trigger audit_append_only before update or delete or truncate on audit
      for each statement execute function refuse_change();
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table audit, sign_in_failures, sessions, users;
    drop function refuse_change();
  `);
}
