import type { Knex } from 'knex';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    -- Says cheaply whether the facts of any part changed since somebody read them all.
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

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop trigger parts_note_change on parts;
    drop function note_catalogue_change();
    drop table catalogue_revision;
  `);
}
