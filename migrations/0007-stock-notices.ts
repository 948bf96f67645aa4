import type { Knex } from 'knex';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    -- Whoever keeps the shelves in memory listens to these notices, so nobody counts revisions any more.
    drop trigger parts_note_change on parts;
    drop function note_catalogue_change();
    drop table catalogue_revision;

    -- Names the parts that a statement touched, as 3,17,204, or says all. One notice a statement, not one
    -- a row; equal notices of a transaction are sent once.
    create function notify_shelves(touched int[]) returns void language plpgsql as $$
    begin
      if cardinality(touched) > 500 then perform pg_notify('shelves', 'all');
      elsif cardinality(touched) > 0 then perform pg_notify('shelves', array_to_string(touched, ','));
      end if;
    end $$;

    create function lots_notify() returns trigger language plpgsql as $$
    begin
      if tg_op = 'INSERT' then
        perform notify_shelves(array(select distinct part_id from new_rows));
      elsif tg_op = 'DELETE' then
        perform notify_shelves(array(select distinct part_id from old_rows));
      elsif tg_op = 'UPDATE' then
        perform notify_shelves(array(select part_id from old_rows union select part_id from new_rows));
      else
        perform pg_notify('shelves', 'all');
      end if;
      return null;
    end $$;
    create trigger lots_notify_insert after insert on lots
      referencing new table as new_rows for each statement execute function lots_notify();
    create trigger lots_notify_update after update on lots
      referencing old table as old_rows new table as new_rows
      for each statement execute function lots_notify();
    create trigger lots_notify_delete after delete on lots
      referencing old table as old_rows for each statement execute function lots_notify();
    create trigger lots_notify_truncate after truncate on lots
      for each statement execute function lots_notify();

    create function parts_notify() returns trigger language plpgsql as $$
    begin
      if tg_op = 'INSERT' then
        perform notify_shelves(array(select id from new_rows));
      elsif tg_op = 'DELETE' then
        perform notify_shelves(array(select id from old_rows));
      elsif tg_op = 'UPDATE' then
        perform notify_shelves(array(select id from old_rows union select id from new_rows));
      else
        perform pg_notify('shelves', 'all');
      end if;
      return null;
    end $$;
    create trigger parts_notify_insert after insert on parts
      referencing new table as new_rows for each statement execute function parts_notify();
    create trigger parts_notify_update after update on parts
      referencing old table as old_rows new table as new_rows
      for each statement execute function parts_notify();
    create trigger parts_notify_delete after delete on parts
      referencing old table as old_rows for each statement execute function parts_notify();
    create trigger parts_notify_truncate after truncate on parts
      for each statement execute function parts_notify();
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop trigger parts_notify_insert on parts;
    drop trigger parts_notify_update on parts;
    drop trigger parts_notify_delete on parts;
    drop trigger parts_notify_truncate on parts;
    drop trigger lots_notify_insert on lots;
    drop trigger lots_notify_update on lots;
    drop trigger lots_notify_delete on lots;
    drop trigger lots_notify_truncate on lots;
    drop function parts_notify();
    drop function lots_notify();
    drop function notify_shelves(int[]);

    create table catalogue_revision (
      only_row boolean primary key default true check (only_row),
      number bigint not null default 1
    );
    insert into catalogue_revision default values;
    create function note_catalogue_change() returns trigger language plpgsql as $$
    begin
      update catalogue_revision set number = number + 1;
      return null;
    end $$;
    create trigger parts_note_change after insert or update or delete on parts
      for each statement execute function note_catalogue_change();
  `);
}
