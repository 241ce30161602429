import type { Knex } from 'knex';

/** Builds, parts, orders, their lines, worksheets; what each side sees of an order. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table builds (
      id uuid primary key,
      shop_id uuid not null references shops (id),
      number integer not null,
      engine text not null check (engine <> ''),
      made jsonb not null,
      customer_name text,
      notes text not null default '',
      needed_on date,
      version integer not null default 1,
      archived_at timestamptz,
      created_at timestamptz not null default now(),
      constraint builds_number unique (shop_id, number),
      constraint builds_tenant unique (id, shop_id)
    );
    create table parts (
      id uuid primary key,
      shop_id uuid not null references shops (id),
      build_id uuid,
      kind text not null,
      maker_no text not null default '',
      stamp text not null default '',
      stamps text[] not null default '{}',
      pieces integer not null check (pieces > 0),
      condition text not null default '',
      version integer not null default 1,
      created_at timestamptz not null default now(),
      constraint parts_tenant unique (id, shop_id),
      constraint parts_build foreign key (build_id, shop_id) references builds (id, shop_id),
      constraint parts_stamps_count check (cardinality(stamps) in (0, pieces))
    );
    comment on column parts.stamps is 'One stamp a piece, where the pieces are told apart by stamp.';
    create index parts_shop_id_idx on parts (shop_id);
    create index parts_build_id_idx on parts (build_id, shop_id);

    create table orders (
      id uuid primary key,
      sender_shop_id uuid not null references shops (id),
      partner_shop_id uuid references shops (id),
      number integer not null,
      build_id uuid,
      status text not null default 'draft' check (status in
        ('draft', 'sent', 'quoted', 'agreed', 'cutting', 'reported', 'accepted', 'rejected', 'closed', 'declined', 'withdrawn', 'cancelled')),
      round integer not null default 1 check (round >= 1),
      currency char(3) not null,
      accept_rule text not null default 'own_check' check (accept_rule in ('readings', 'own_check')),
      transport text not null default 'delivered' check (transport in ('delivered', 'fetched')),
      needed_back_on date,
      promised_on date,
      first_promised_on date,
      promise_days integer check (promise_days > 0),
      price_punch text not null default 'unmet' check (price_punch in ('met', 'unmet')),
      parts_punch text not null default 'unmet' check (parts_punch in ('met', 'unmet')),
      sizes_punch text not null default 'unmet' check (sizes_punch in ('met', 'unmet', 'not_needed')),
      stopped boolean not null default false,
      clear boolean not null default false,
      sender_step text,
      partner_step text,
      clock text not null default 'none' check (clock in ('none', 'sender', 'partner', 'road', 'snag')),
      clock_since timestamptz not null default now(),
      latest_rev integer,
      title text not null default '',
      words text[] not null default '{}',
      notes text not null default '',
      standing_instruction text not null default '',
      copied_from_id uuid references orders (id),
      sent_at timestamptz,
      agreed_at timestamptz,
      ended_at timestamptz,
      version integer not null default 1,
      log_seq integer not null default 0,
      created_at timestamptz not null default now(),
      constraint orders_number unique (sender_shop_id, number),
      constraint orders_two_parties check (sender_shop_id <> partner_shop_id),
      constraint orders_partner_unless_draft check (partner_shop_id is not null or status in ('draft')),
      constraint orders_build foreign key (build_id, sender_shop_id) references builds (id, shop_id)
    );
    create index orders_partner_shop_id_idx on orders (partner_shop_id);
    create index orders_build_id_idx on orders (build_id, sender_shop_id);
    create index orders_copied_from_id_idx on orders (copied_from_id);

    create table order_sides (
      shop_id uuid not null references shops (id),
      order_id uuid not null references orders (id),
      side text not null check (side in ('sender', 'partner')),
      other_shop_id uuid references shops (id),
      number integer not null,
      status text not null,
      open boolean not null,
      step text,
      their_step text,
      clock text not null,
      clock_since timestamptz not null,
      needed_back_on date,
      promised_on date,
      title text not null,
      price_punch text not null,
      parts_punch text not null,
      sizes_punch text not null,
      stopped boolean not null,
      clear boolean not null,
      primary key (shop_id, order_id),
      constraint order_sides_one_each unique (order_id, side)
    );
    create index order_sides_move_idx on order_sides (shop_id, open, (step is not null), clock_since, order_id);
    create index order_sides_status_idx on order_sides (shop_id, status, clock_since, order_id);
    create index order_sides_other_idx on order_sides (shop_id, other_shop_id, clock_since, order_id);
    create index order_sides_needed_idx on order_sides (shop_id, needed_back_on, order_id);
    create index order_sides_number_idx on order_sides (shop_id, number desc, order_id);
    create index order_sides_other_shop_id_idx on order_sides (other_shop_id);
    create table order_words (
      shop_id uuid not null,
      word text collate "C" not null,
      order_id uuid not null,
      primary key (shop_id, word, order_id),
      constraint order_words_side foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index order_words_order_idx on order_words (order_id, shop_id);
    create table order_references (
      shop_id uuid not null,
      order_id uuid not null,
      text text not null,
      primary key (shop_id, order_id),
      constraint order_references_side foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index order_references_order_idx on order_references (order_id);

    create table order_parts (
      order_id uuid not null references orders (id),
      part_id uuid not null references parts (id),
      kind text not null,
      stamp text not null,
      stamps text[] not null default '{}',
      maker_no text not null,
      pieces integer not null check (pieces > 0),
      engine text not null default '',
      made jsonb,
      primary key (order_id, part_id)
    );
    create index order_parts_part_id_idx on order_parts (part_id);
    create table order_lines (
      id uuid primary key,
      order_id uuid not null references orders (id),
      position integer not null,
      operation text not null,
      catalogue_version integer not null,
      needs_sizes boolean not null,
      title text not null,
      started_at timestamptz,
      stop_due boolean not null default false,
      removed_at timestamptz,
      constraint order_lines_position unique (order_id, position),
      constraint order_lines_tenant unique (id, order_id)
    );
    comment on column order_lines.stop_due is 'A new rev came while this line was being cut and its question is not answered yet.';
    create table order_line_parts (
      line_id uuid not null,
      order_id uuid not null,
      part_id uuid not null,
      primary key (line_id, order_id, part_id),
      constraint order_line_parts_line foreign key (line_id, order_id) references order_lines (id, order_id),
      constraint order_line_parts_part foreign key (order_id, part_id) references order_parts (order_id, part_id)
    );
    create index order_line_parts_part_idx on order_line_parts (order_id, part_id);
    create table worksheets (
      id uuid primary key,
      shop_id uuid not null references shops (id),
      order_id uuid,
      line_id uuid,
      operation text not null,
      raw jsonb not null,
      shared boolean not null default false,
      version integer not null default 1,
      saved_at timestamptz not null default now(),
      constraint worksheets_line unique (line_id, order_id),
      constraint worksheets_order_line foreign key (line_id, order_id) references order_lines (id, order_id)
    );
    comment on column worksheets.shared is 'The sender asked the partner to fill it in.';
    create index worksheets_shop_id_idx on worksheets (shop_id);
    create index worksheets_order_idx on worksheets (order_id);

    call guard_table('builds'); call guard_table('parts'); call guard_table('orders'); call guard_table('order_sides');
    call guard_table('order_words'); call guard_table('order_references'); call guard_table('order_parts');
    call guard_table('order_lines'); call guard_table('order_line_parts'); call guard_table('worksheets');
    call let_shop_only('builds'); call let_shop_only('parts');
    call let_shop_only('order_sides'); call let_shop_only('order_words'); call let_shop_only('order_references');

    -- Who may see an order is one fact: a side row of one's own shop.
    create procedure let_parties(name text) language plpgsql as $$
    begin
      execute format($policy$create policy %I on %I to wiretag_app
        using (exists (select 1 from order_sides s where s.order_id = %I.order_id and s.shop_id = (select app_shop()))
          and ((select app_only_order()) is null or (select app_only_order()) = order_id))
        with check (exists (select 1 from order_sides s where s.order_id = %I.order_id and s.shop_id = (select app_shop()))
          and ((select app_only_order()) is null or (select app_only_order()) = order_id))$policy$,
        name || '_parties', name, name, name);
    end $$;
    call let_parties('order_parts'); call let_parties('order_lines'); call let_parties('order_line_parts');
    create policy orders_parties on orders to wiretag_app
      using ((sender_shop_id = (select app_shop()) or (partner_shop_id = (select app_shop()) and status <> 'draft'))
        and ((select app_only_order()) is null or (select app_only_order()) = id))
      with check ((sender_shop_id = (select app_shop()) or (partner_shop_id = (select app_shop()) and status <> 'draft'))
        and ((select app_only_order()) is null or (select app_only_order()) = id));
    create policy worksheets_shop on worksheets to wiretag_app
      using (shop_id = (select app_shop())) with check (shop_id = (select app_shop()));
    create policy worksheets_lent on worksheets to wiretag_app
      using (shared and exists (select 1 from order_sides s where s.order_id = worksheets.order_id and s.shop_id = (select app_shop())))
      with check (shared and exists (select 1 from order_sides s where s.order_id = worksheets.order_id and s.shop_id = (select app_shop())));

    grant select, insert, update (engine, made, customer_name, notes, needed_on, version, archived_at) on builds to wiretag_app;
    grant select, insert, update (build_id, kind, maker_no, stamp, stamps, pieces, condition, version) on parts to wiretag_app;
    grant select, insert on orders to wiretag_app;
    grant update (partner_shop_id, build_id, status, round, accept_rule, transport, needed_back_on, promised_on, first_promised_on,
      promise_days, price_punch, parts_punch, sizes_punch, stopped, clear, sender_step, partner_step, clock, clock_since, latest_rev,
      title, words, notes, standing_instruction, sent_at, agreed_at, ended_at, version, log_seq) on orders to wiretag_app;
    grant select on order_sides, order_words to wiretag_app;
    grant select, insert, update (text) on order_references to wiretag_app;
    grant select, insert, update (stamp, stamps, pieces), delete on order_parts to wiretag_app;
    grant select, insert, update (position, operation, catalogue_version, needs_sizes, title, started_at, stop_due, removed_at), delete on order_lines to wiretag_app;
    grant select, insert, delete on order_line_parts to wiretag_app;
    grant select, insert, update (raw, shared, version, saved_at), delete on worksheets to wiretag_app;
    grant delete on orders to wiretag_app;
    create policy orders_discard on orders as restrictive for delete to wiretag_app using (status = 'draft' and sender_shop_id = (select app_shop()));

    -- One row a party, kept by the database alone.
    create function project_sides() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    declare is_open boolean := new.ended_at is null;
    begin
      insert into order_sides as s (shop_id, order_id, side, other_shop_id, number, status, open, step, their_step, clock, clock_since,
          needed_back_on, promised_on, title, price_punch, parts_punch, sizes_punch, stopped, clear)
      select side.shop, new.id, side.name, side.other, new.number, new.status, is_open, side.step, side.theirs, new.clock, new.clock_since,
          new.needed_back_on, new.promised_on, new.title, new.price_punch, new.parts_punch, new.sizes_punch, new.stopped, new.clear
      from (values ('sender', new.sender_shop_id, case when new.status = 'draft' then null else new.partner_shop_id end, new.sender_step, new.partner_step),
                   ('partner', new.partner_shop_id, new.sender_shop_id, new.partner_step, new.sender_step)) as side (name, shop, other, step, theirs)
      where side.shop is not null and (side.name = 'sender' or new.status <> 'draft')
      on conflict (shop_id, order_id) do update set other_shop_id = excluded.other_shop_id, status = excluded.status, open = excluded.open,
        step = excluded.step, their_step = excluded.their_step, clock = excluded.clock, clock_since = excluded.clock_since,
        needed_back_on = excluded.needed_back_on, promised_on = excluded.promised_on, title = excluded.title, price_punch = excluded.price_punch,
        parts_punch = excluded.parts_punch, sizes_punch = excluded.sizes_punch, stopped = excluded.stopped, clear = excluded.clear;
      delete from order_words w where w.order_id = new.id and not (w.word = any (new.words));
      insert into order_words (shop_id, word, order_id)
        select s.shop_id, w.word, new.id from order_sides s cross join unnest(new.words) as w (word)
        where s.order_id = new.id on conflict do nothing;
      return null;
    end $$;
    create trigger orders_project_sides after insert or update on orders for each row execute function project_sides();

    create function forget_draft() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if old.status <> 'draft' then raise exception 'only a draft can be thrown away' using errcode = 'check_violation'; end if;
      delete from order_references where order_id = old.id;
      delete from order_words where order_id = old.id;
      delete from worksheets where order_id = old.id;
      delete from order_line_parts where order_id = old.id;
      delete from order_lines where order_id = old.id;
      delete from order_parts where order_id = old.id;
      delete from order_sides where order_id = old.id;
      return old;
    end $$;
    create trigger orders_forget_draft before delete on orders for each row execute function forget_draft();

    -- Status moves only along these pairs; parties never change after sending.
    create function guard_order() returns trigger language plpgsql as $$
    begin
      if new.sender_shop_id <> old.sender_shop_id or new.number <> old.number
         or (old.status <> 'draft' and new.partner_shop_id is distinct from old.partner_shop_id)
      then raise exception 'the parties of an order never change' using errcode = 'check_violation', constraint = 'orders_parties_fixed'; end if;
      if new.status <> old.status and not (old.status || '>' || new.status = any (array[
        'draft>sent', 'sent>quoted', 'sent>declined', 'sent>withdrawn', 'quoted>sent', 'quoted>agreed', 'quoted>declined', 'quoted>withdrawn',
        'quoted>quoted', 'agreed>cutting', 'agreed>cancelled', 'cutting>reported', 'cutting>cancelled', 'reported>cutting', 'reported>accepted',
        'reported>rejected', 'reported>cancelled', 'accepted>closed', 'rejected>closed', 'reported>closed']))
      then raise exception 'an order does not go from % to %', old.status, new.status using errcode = 'check_violation', constraint = 'orders_status_moves'; end if;
      if old.status = 'reported' and new.status = 'cutting' and new.round <> old.round + 1
      then raise exception 'sending back begins a new round' using errcode = 'check_violation', constraint = 'orders_rounds'; end if;
      return new;
    end $$;
    create trigger orders_guard before update on orders for each row execute function guard_order();
  `);
}

/** Drops builds, parts and orders. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table worksheets, order_line_parts, order_lines, order_parts, order_references, order_words, order_sides, orders, parts, builds cascade;
    drop function project_sides(), forget_draft(), guard_order();
    drop procedure let_parties(text);
  `);
}
