import type { Knex } from 'knex';

/** A piece that gets another stamp at the machine shop: who, when, old and new, with a photo. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table restamps (
      id uuid primary key,
      order_id uuid not null references orders (id),
      part_id uuid not null,
      from_stamp text not null check (from_stamp <> ''),
      to_stamp text not null check (to_stamp <> '' and to_stamp <> from_stamp),
      words text not null default '',
      shop_id uuid not null,
      person_id uuid not null references people (id),
      author_name text not null,
      at timestamptz not null,
      constraint restamps_part foreign key (order_id, part_id) references order_parts (order_id, part_id),
      constraint restamps_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index restamps_order_idx on restamps (order_id, part_id);
    create index restamps_author_idx on restamps (shop_id, order_id);
    create index restamps_person_id_idx on restamps (person_id);
    call guard_table('restamps'); call let_parties('restamps'); call let_author_write('restamps', 'partner'); call make_append_only('restamps');
    grant select, insert on restamps to wiretag_app;

    alter table attachments add column restamp_id uuid references restamps (id);
    create index attachments_restamp_id_idx on attachments (restamp_id);
    alter table attachments drop constraint attachments_one_owner;
    alter table attachments add constraint attachments_one_owner check (num_nonnulls(message_id, move_id, snag_id, line_id, restamp_id) <= 1);
    grant update (restamp_id) on attachments to wiretag_app;

    -- A stamp is there when it came, was not sent back, and no other stamp was put in its place.
    create or replace function stamp_count(of_order uuid, of_part uuid, of_stamp text) returns bigint
      language sql stable security definer set search_path = public, pg_temp as $$
      select coalesce(sum(n), 0) from (
        select case m.kind when 'checked_in' then 1 when 'sent_back' then -1 else 0 end as n
        from custody_moves m cross join unnest(m.stamps) as seen (stamp)
        where m.order_id = of_order and m.part_id = of_part and seen.stamp = of_stamp
          and not exists (select 1 from custody_moves later where later.replaces_id = m.id)
        union all
        select case when r.to_stamp = of_stamp then 1 else -1 end from restamps r
        where r.order_id = of_order and r.part_id = of_part and of_stamp in (r.from_stamp, r.to_stamp)) as counted $$;
  `);
}

/** Takes restamping away; stamps are counted by the moves alone again. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    create or replace function stamp_count(of_order uuid, of_part uuid, of_stamp text) returns bigint
      language sql stable security definer set search_path = public, pg_temp as $$
      select coalesce(sum(case m.kind when 'checked_in' then 1 when 'sent_back' then -1 else 0 end), 0)
      from custody_moves m cross join unnest(m.stamps) as seen (stamp)
      where m.order_id = of_order and m.part_id = of_part and seen.stamp = of_stamp
        and not exists (select 1 from custody_moves later where later.replaces_id = m.id) $$;
    alter table attachments drop column restamp_id;
    alter table attachments add constraint attachments_one_owner check (num_nonnulls(message_id, move_id, snag_id, line_id) <= 1);
    drop table restamps;
  `);
}
