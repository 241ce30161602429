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
    create function stamp_count(of_order uuid, of_part uuid, of_stamp text) returns bigint
      language sql stable security definer set search_path = public, pg_temp as $$
      select coalesce(sum(n), 0) from (
        select case m.kind when 'checked_in' then 1 when 'sent_back' then -1 else 0 end as n
        from custody_moves m cross join unnest(m.stamps) as seen (stamp)
        where m.order_id = of_order and m.part_id = of_part and seen.stamp = of_stamp
          and not exists (select 1 from custody_moves later where later.replaces_id = m.id)
        union all
        select case when r.to_stamp = of_stamp then 1 else -1 end from restamps r
        where r.order_id = of_order and r.part_id = of_part and of_stamp in (r.from_stamp, r.to_stamp)) as counted $$;
    create or replace function line_not_clear(asked uuid) returns text language plpgsql stable security definer set search_path = public, pg_temp as $$
    declare line order_lines; newest integer;
    begin
      select * into line from order_lines where id = asked;
      if line.stop_due then return 'what is already cut is not said'; end if;
      if exists (select 1 from holds h where h.order_id = line.order_id and h.lifted_at is null and (h.line_id is null or h.line_id = line.id))
      then return 'a hold stands'; end if;
      if exists (select 1 from snags g where g.order_id = line.order_id and (g.line_id is null or g.line_id = line.id)
        and (g.state in ('raised', 'asked') or (g.state = 'approved' and g.sizes_due)))
      then return 'a snag stands'; end if;
      if not exists (select 1 from quote_answers a where a.order_id = line.order_id and a.answer = 'agree'
        and (a.kind = 'work' or (a.kind = 'inspection' and not line.needs_sizes)))
      then return 'the price is not agreed'; end if;
      if exists (
        select 1 from order_line_parts lp join order_parts p using (order_id, part_id)
        where lp.line_id = line.id and (
          p.pieces > (select coalesce(sum(case m.kind when 'checked_in' then m.pieces when 'sent_back' then -m.pieces else 0 end), 0)
            from custody_moves m where m.order_id = line.order_id and m.part_id = p.part_id
              and not exists (select 1 from custody_moves later where later.replaces_id = m.id))
          or exists (select 1 from unnest(p.stamps) as s (stamp) where stamp_count(line.order_id, p.part_id, s.stamp) < 1)))
      then return 'the pieces are not all there'; end if;
      if line.needs_sizes then
        select max(number) into newest from revs where order_id = line.order_id;
        if not exists (select 1 from rev_sizes z where z.order_id = line.order_id and z.rev = newest and z.line_id = line.id)
        then return 'there are no sizes'; end if;
        if exists (select 1 from rev_sizes z join rev_lines v using (order_id, rev, line_id)
          where z.order_id = line.order_id and z.rev = newest and z.line_id = line.id
            and not exists (select 1 from repeat_backs b where b.order_id = z.order_id and b.line_id = z.line_id and b.since = v.since
              and b.matches and b.what = z.what and b.lower_nm = z.lower_nm and b.upper_nm = z.upper_nm))
        then return 'the sizes are not repeated back'; end if;
      end if;
      return null;
    end $$;
    revoke all on function stamp_count(uuid, uuid, text), line_not_clear(uuid) from public;
  `);
}

/** Takes restamping away; the questions of a line stay until their function goes. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop function stamp_count(uuid, uuid, text);
    alter table attachments drop column restamp_id;
    alter table attachments add constraint attachments_one_owner check (num_nonnulls(message_id, move_id, snag_id, line_id) <= 1);
    drop table restamps;
  `);
}
