import type { Knex } from 'knex';

/** What the bench and the lists ask for, whatever a shop has behind it: pieces away, open promises, each way to sort. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    -- Whose pieces, and in whose hands: two columns, so that neither shop's view has to look through all its orders.
    alter table part_places add column with_shop_id uuid references shops (id);
    comment on column part_places.with_shop_id is 'The machine shop of the order that the pieces are out on; null at home.';
    update part_places p set with_shop_id = o.partner_shop_id from orders o where o.id = p.order_id;
    alter table part_places add constraint part_places_with check ((order_id is null) = (with_shop_id is null));
    create index part_places_away_idx on part_places (shop_id, place, order_id) where place <> 'home' and pieces > 0;
    create index part_places_with_idx on part_places (with_shop_id, place, order_id);
    drop policy part_places_party on part_places;
    create policy part_places_party on part_places for select to wiretag_app using (with_shop_id = (select app_shop())
      and ((select app_only_order()) is null or (select app_only_order()) = order_id));
    create or replace function shift_pieces(part uuid, from_place text, from_order uuid, to_place text, to_order uuid, n integer) returns void
      language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      update part_places set pieces = pieces - n
        where part_id = part and place = from_place and order_id is not distinct from from_order and pieces >= n;
      if not found then
        raise exception 'there are not so many pieces there' using errcode = 'check_violation', constraint = 'part_places_enough';
      end if;
      insert into part_places (part_id, shop_id, place, order_id, with_shop_id, pieces)
        select part, p.shop_id, to_place, to_order, (select o.partner_shop_id from orders o where o.id = to_order), n from parts p where p.id = part
      on conflict (part_id, place, order_id) do update set pieces = part_places.pieces + n;
    end $$;

    drop index order_sides_move_idx, order_sides_needed_idx;
    create index order_sides_mine_idx on order_sides (shop_id, clock_since, order_id) where open and step is not null;
    create index order_sides_theirs_idx on order_sides (shop_id, clock_since, order_id) where open and step is null;
    create index order_sides_open_idx on order_sides (shop_id, order_id) include (side, other_shop_id) where open;
    create index order_sides_promised_idx on order_sides (shop_id, promised_on, number, order_id)
      where open and side = 'sender' and promised_on is not null;
    create index order_sides_waiting_idx on order_sides (shop_id, clock_since, order_id);
    create index order_sides_needed_first_idx on order_sides (shop_id, coalesce(needed_back_on, 'infinity'::date), order_id);
    create index orders_ended_idx on orders (sender_shop_id, ended_at desc) where status = 'closed';
    create index parts_newest_idx on parts (shop_id, created_at desc, id desc);
    drop index parts_shop_id_idx;
  `);
}

/** Drops the indexes, and the second way to see a place. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop index order_sides_mine_idx, order_sides_theirs_idx, order_sides_open_idx, order_sides_promised_idx, order_sides_waiting_idx,
      order_sides_needed_first_idx, orders_ended_idx, part_places_away_idx, part_places_with_idx, parts_newest_idx;
    create index parts_shop_id_idx on parts (shop_id);
    create index order_sides_move_idx on order_sides (shop_id, open, (step is not null), clock_since, order_id);
    create index order_sides_needed_idx on order_sides (shop_id, needed_back_on, order_id);
    drop policy part_places_party on part_places;
    alter table part_places drop column with_shop_id;
    create policy part_places_party on part_places for select to wiretag_app using (order_id is not null and exists (
      select 1 from order_sides s where s.order_id = part_places.order_id and s.shop_id = (select app_shop())));
  `);
}
