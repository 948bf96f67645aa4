import type { Knex } from 'knex';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table stock_ledger (
      id bigint generated always as identity primary key,
      lot_id int not null references lots (id),
      delta int not null check (delta <> 0),
      balance int not null check (balance >= 0),
      reason text not null check (reason in
        ('opening', 'counted', 'received', 'damaged', 'lost', 'found', 'returned', 'shipped')),
      order_id bigint references orders (id),
      actor_id uuid references users (id),
      actor_name text not null,
      note text,
      at timestamptz not null default now(),
      constraint stock_ledger_shipment_has_order check (reason <> 'shipped' or (order_id is not null and delta < 0))
    );
    create index stock_ledger_by_lot on stock_ledger (lot_id, id);
    create index stock_ledger_by_order on stock_ledger (order_id) where order_id is not null;
    create trigger stock_ledger_append_only before update or delete or truncate on stock_ledger
      for each statement execute function refuse_change();

    -- The ledger is the only way to change what is on hand: each entry moves its lot and writes the balance.
    create function post_to_lot() returns trigger language plpgsql as $$
    begin
      update lots set on_hand = on_hand + new.delta where id = new.lot_id returning on_hand into new.balance;
      return new;
    end $$;
    create trigger stock_ledger_posts before insert on stock_ledger
      for each row execute function post_to_lot();

    create table reservations (
      id bigint generated always as identity primary key,
      order_id bigint not null references orders (id),
      lot_id int not null references lots (id),
      quantity int not null check (quantity > 0),
      picked int not null default 0,
      state text not null check (state in ('held', 'allocated', 'released', 'consumed')),
      created_at timestamptz not null default now(),
      constraint reservations_lot_once unique (order_id, lot_id),
      constraint reservations_picked_within check (picked between 0 and quantity)
    );
    create index reservations_by_lot on reservations (lot_id) where state in ('held', 'allocated');

    -- Reserved on a lot is the sum of its live reservations; the lot's CHECK refuses a promise of absent parts.
    create function reserve_on_lot() returns trigger language plpgsql as $$
    declare
      before_qty int := 0;
      after_qty int := 0;
    begin
      if tg_op = 'UPDATE' and (new.lot_id <> old.lot_id or new.order_id <> old.order_id) then
        raise exception 'a reservation cannot move' using errcode = 'restrict_violation';
      end if;
      if tg_op <> 'INSERT' and old.state in ('held', 'allocated') then before_qty := old.quantity; end if;
      if tg_op <> 'DELETE' and new.state in ('held', 'allocated') then after_qty := new.quantity; end if;
      if before_qty <> after_qty then
        update lots set reserved = reserved + after_qty - before_qty
          where id = coalesce(new.lot_id, old.lot_id);
      end if;
      return null;
    end $$;
    create trigger reservations_reserve after insert or update or delete on reservations
      for each row execute function reserve_on_lot();

    create function lots_move_by_ledger_only() returns trigger language plpgsql as $$
    begin
      if tg_op = 'INSERT' and (new.on_hand <> 0 or new.reserved <> 0) then
        raise exception 'a new lot starts empty; post its opening to the ledger' using errcode = 'restrict_violation';
      end if;
      if tg_op = 'UPDATE' and (new.on_hand <> old.on_hand or new.reserved <> old.reserved)
          and pg_trigger_depth() < 2 then
        raise exception 'on hand and reserved move by ledger and reservations only' using errcode = 'restrict_violation';
      end if;
      return new;
    end $$;
    create trigger lots_guarded before insert or update on lots
      for each row execute function lots_move_by_ledger_only();
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop trigger lots_guarded on lots;
    drop table reservations, stock_ledger;
    drop function lots_move_by_ledger_only();
    drop function reserve_on_lot();
    drop function post_to_lot();
  `);
}
