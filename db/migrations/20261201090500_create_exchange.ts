import type { Knex } from 'knex';

/** The log, messages, files, the live feed, notices, idempotency keys and clock legs. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table events (
      id bigint generated always as identity primary key,
      order_id uuid not null references orders (id),
      shop_id uuid not null,
      seq integer not null,
      type text not null,
      v integer not null default 1,
      payload jsonb not null,
      person_id uuid references people (id),
      author_name text not null,
      side text not null check (side in ('sender', 'partner')),
      private_to uuid references shops (id),
      occurred_at timestamptz not null,
      recorded_at timestamptz not null default now(),
      constraint events_seq unique (order_id, seq),
      constraint events_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index events_author_idx on events (shop_id, order_id);
    create index events_person_id_idx on events (person_id);
    create index events_private_to_idx on events (private_to);
    create table messages (
      id uuid primary key,
      order_id uuid not null references orders (id),
      shop_id uuid not null,
      person_id uuid not null references people (id),
      author_name text not null,
      kind text not null default 'message' check (kind in ('message', 'we_spoke')),
      body text not null check (body <> ''),
      event_id bigint not null references events (id),
      at timestamptz not null,
      constraint messages_event unique (event_id),
      constraint messages_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index messages_order_id_idx on messages (order_id);
    create index messages_author_idx on messages (shop_id, order_id);
    create index messages_person_id_idx on messages (person_id);
    create table thread_reads (
      person_id uuid not null references people (id),
      order_id uuid not null references orders (id),
      shop_id uuid not null references shops (id),
      seen_seq integer not null,
      primary key (person_id, order_id)
    );
    create index thread_reads_order_id_idx on thread_reads (order_id);
    create index thread_reads_shop_id_idx on thread_reads (shop_id);
    create table attachments (
      id uuid primary key,
      shop_id uuid not null references shops (id),
      order_id uuid references orders (id),
      message_id uuid references messages (id),
      move_id uuid references custody_moves (id),
      snag_id uuid references snags (id),
      line_id uuid references order_lines (id),
      key text not null,
      name text not null,
      type text not null,
      bytes bigint not null default 0,
      sha256 text,
      width integer,
      height integer,
      thumb_key text,
      state text not null check (state in ('pending', 'ready', 'refused')),
      person_id uuid not null references people (id),
      at timestamptz not null default now(),
      constraint attachments_key unique (key),
      constraint attachments_one_owner check (num_nonnulls(message_id, move_id, snag_id, line_id) <= 1),
      constraint attachments_ready check ((state = 'ready') = (sha256 is not null))
    );
    create index attachments_order_id_idx on attachments (order_id);
    create index attachments_shop_id_idx on attachments (shop_id);
    create index attachments_message_id_idx on attachments (message_id);
    create index attachments_move_id_idx on attachments (move_id);
    create index attachments_snag_id_idx on attachments (snag_id);
    create index attachments_line_id_idx on attachments (line_id);
    create index attachments_person_id_idx on attachments (person_id);
    create table feed (
      shop_id uuid not null references shops (id),
      seq bigint not null,
      event_id bigint not null references events (id),
      order_id uuid not null references orders (id),
      kind text not null,
      at timestamptz not null default now(),
      primary key (shop_id, seq)
    );
    create index feed_event_id_idx on feed (event_id);
    create index feed_order_id_idx on feed (order_id);
    create table notices (
      id uuid primary key,
      shop_id uuid not null references shops (id),
      order_id uuid references orders (id),
      event_id bigint references events (id),
      person_id uuid references people (id),
      email_norm text,
      kind text not null,
      step text,
      detail jsonb not null default '{}',
      state text not null default 'waiting' check (state in ('waiting', 'sent', 'dropped')),
      tries integer not null default 0,
      sent_at timestamptz,
      problem text not null default '',
      created_at timestamptz not null default now(),
      constraint notices_once unique (event_id, person_id),
      constraint notices_reader check (num_nonnulls(person_id, email_norm) = 1)
    );
    create index notices_order_id_idx on notices (order_id);
    create index notices_shop_id_idx on notices (shop_id);
    create index notices_person_id_idx on notices (person_id);
    create table idempotency_keys (
      person_id uuid not null references people (id),
      route text not null,
      key text not null,
      shop_id uuid not null references shops (id),
      fingerprint text not null,
      answer jsonb,
      until timestamptz not null default now() + interval '7 days',
      primary key (person_id, route, key)
    );
    create index idempotency_keys_shop_id_idx on idempotency_keys (shop_id);
    create table clock_legs (
      order_id uuid not null references orders (id),
      n integer not null check (n >= 1),
      round integer not null,
      booked_to text not null check (booked_to in ('sender', 'partner', 'road', 'snag')),
      calendar_shop_id uuid not null references shops (id),
      started_at timestamptz not null,
      ended_at timestamptz,
      started_seq integer not null,
      primary key (order_id, n),
      constraint clock_legs_forward check (ended_at >= started_at),
      constraint clock_legs_event foreign key (order_id, started_seq) references events (order_id, seq) deferrable initially deferred
    );
    create unique index clock_legs_one_open_idx on clock_legs (order_id) where ended_at is null;
    create index clock_legs_event_idx on clock_legs (order_id, started_seq);
    create index clock_legs_calendar_shop_id_idx on clock_legs (calendar_shop_id);

    do $$ declare t text; begin
      foreach t in array array['events', 'messages', 'thread_reads', 'attachments', 'feed', 'notices', 'idempotency_keys', 'clock_legs'] loop
        call guard_table(t);
      end loop;
    end $$;
    call make_append_only('events');
    call let_parties('messages'); call let_parties('clock_legs'); call let_shop_only('feed'); call let_shop_only('notices');
    create policy events_parties on events to wiretag_app
      using (exists (select 1 from order_sides s where s.order_id = events.order_id and s.shop_id = (select app_shop()))
        and ((select app_only_order()) is null or (select app_only_order()) = order_id)
        and (private_to is null or private_to = (select app_shop())))
      with check (shop_id = (select app_shop()) and (private_to is null or private_to = (select app_shop())));
    create policy thread_reads_own on thread_reads to wiretag_app
      using (person_id = (select app_person()) and shop_id = (select app_shop()))
      with check (person_id = (select app_person()) and shop_id = (select app_shop()));
    create policy idempotency_keys_own on idempotency_keys to wiretag_app
      using (person_id = (select app_person()) and shop_id = (select app_shop()))
      with check (person_id = (select app_person()) and shop_id = (select app_shop()));
    create policy attachments_mine on attachments to wiretag_app
      using (shop_id = (select app_shop())) with check (shop_id = (select app_shop()));
    create policy attachments_parties on attachments for select to wiretag_app using (order_id is not null and exists (
      select 1 from order_sides s where s.order_id = attachments.order_id and s.shop_id = (select app_shop())));

    grant select, insert on events, messages, feed to wiretag_app;
    revoke insert on feed from wiretag_app;
    grant select, insert, update (seen_seq) on thread_reads to wiretag_app;
    grant select, insert, update (message_id, move_id, snag_id, line_id, bytes, sha256, width, height, thumb_key, state, type), delete on attachments to wiretag_app;
    grant select, update (state, tries, sent_at, problem) on notices to wiretag_app;
    grant select, insert, update (answer) on idempotency_keys to wiretag_app;
    grant select, insert, update (ended_at) on clock_legs to wiretag_app;

    -- Each party's feed in commit order, without holes: numbers are drawn under a row lock when the transaction ends.
    create function feed_event() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    declare side_row record; n bigint;
    begin
      for side_row in select shop_id from order_sides where order_id = new.order_id
          and (new.private_to is null or new.private_to = shop_id) order by shop_id loop
        update shop_counters set feed_seq = feed_seq + 1 where shop_id = side_row.shop_id returning feed_seq into n;
        insert into feed (shop_id, seq, event_id, order_id, kind) values (side_row.shop_id, n, new.id, new.order_id, new.type);
        perform pg_notify('feed', side_row.shop_id::text);
      end loop;
      return null;
    end $$;
    create constraint trigger events_feed after insert on events deferrable initially deferred for each row execute function feed_event();

    create function guard_event() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if new.seq <> 1 + coalesce((select max(seq) from events where order_id = new.order_id), 0)
      then raise exception 'an order''s log runs 1, 2, 3' using errcode = 'check_violation', constraint = 'events_no_gap'; end if;
      return new;
    end $$;
    create trigger events_guard before insert on events for each row execute function guard_event();

    -- Who is told of a step: the members of a shop whose roles may do it, without the one who acted.
    create function tell_shop(notified_shop uuid, about_order uuid, about_seq integer, what text, next_step text, wanted_roles text[])
      returns setof uuid language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if not exists (select 1 from order_sides where order_id = about_order and shop_id = app_shop())
      then raise exception 'not a party' using errcode = 'insufficient_privilege'; end if;
      return query
        insert into notices (id, shop_id, order_id, event_id, person_id, kind, step)
        select gen_random_uuid(), notified_shop, about_order, e.id, m.person_id, what, next_step
        from events e join order_sides s on s.order_id = e.order_id and s.shop_id = notified_shop
        join memberships m on m.shop_id = notified_shop and m.ended_at is null and m.roles && wanted_roles
        join people p on p.id = m.person_id and p.disabled_at is null
        where e.order_id = about_order and e.seq = about_seq and m.person_id is distinct from app_person()
        on conflict on constraint notices_once do nothing
        returning id;
    end $$;
    create function tell_address(notice uuid, telling_shop uuid, address text, what text, more jsonb) returns void
      language sql security definer set search_path = public, pg_temp as $$
      insert into notices (id, shop_id, email_norm, kind, detail) values (notice, telling_shop, address, what, more) $$;
    create function tell_reset(notice uuid, address text, more jsonb) returns void
      language sql security definer set search_path = public, pg_temp as $$
      insert into notices (id, shop_id, email_norm, kind, detail)
      select notice, m.shop_id, address, 'password.reset', more from people p join memberships m on m.person_id = p.id and m.ended_at is null
      where p.email_norm = address order by m.created_at limit 1 $$;
    create function take_notice(notice uuid) returns notices
      language sql security definer set search_path = public, pg_temp as $$
      update notices set tries = tries + 1 where id = notice and state = 'waiting' returning * $$;
    create function close_notice(notice uuid, outcome text, why text) returns void
      language sql security definer set search_path = public, pg_temp as $$
      update notices set state = outcome, problem = left(why, 300), sent_at = case when outcome = 'sent' then now() end where id = notice $$;
    create function reader_of(notice uuid) returns table (email text, name text, shop_id uuid, person_id uuid)
      language sql stable security definer set search_path = public, pg_temp as $$
      select coalesce(p.email_norm, n.email_norm), coalesce(p.name, ''), n.shop_id, n.person_id
      from notices n left join people p on p.id = n.person_id where n.id = notice $$;

    -- agreed -> cutting asks the same questions as the order machine, on purpose a second time.
    create function guard_cutting() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if new.status = 'cutting' and old.status = 'agreed' then
        if exists (select 1 from holds h where h.order_id = new.id and h.lifted_at is null and h.line_id is null)
          or exists (select 1 from snags g where g.order_id = new.id and g.line_id is null and (g.state in ('raised', 'asked') or g.sizes_due))
        then raise exception 'a hold or snag stands' using errcode = 'check_violation', constraint = 'orders_clear_to_cut'; end if;
        if not exists (select 1 from quote_answers a where a.order_id = new.id and a.answer = 'agree')
          or not exists (select 1 from part_places p where p.order_id = new.id and p.place = 'partner' and p.pieces > 0)
        then raise exception 'price or parts are not met' using errcode = 'check_violation', constraint = 'orders_clear_to_cut'; end if;
        if exists (select 1 from order_lines l where l.order_id = new.id and l.started_at is not null and l.needs_sizes and l.removed_at is null
          and not exists (select 1 from rev_lines v where v.line_id = l.id
            and v.rev = (select max(number) from revs where order_id = new.id)
            and not exists (select 1 from rev_sizes z where z.order_id = v.order_id and z.rev = v.rev and z.line_id = v.line_id
              and not exists (select 1 from repeat_backs b where b.order_id = z.order_id and b.line_id = z.line_id and b.since = v.since
                and b.matches and b.what = z.what and b.lower_nm = z.lower_nm and b.upper_nm = z.upper_nm))))
        then raise exception 'the sizes are not repeated back' using errcode = 'check_violation', constraint = 'orders_clear_to_cut'; end if;
      end if;
      return null;
    end $$;
    create constraint trigger orders_guard_cutting after update of status on orders deferrable initially deferred
      for each row execute function guard_cutting();

    revoke all on all functions in schema public from public;
    grant execute on function tell_shop(uuid, uuid, integer, text, text, text[]), tell_address(uuid, uuid, text, text, jsonb), tell_reset(uuid, text, jsonb),
      take_notice(uuid), close_notice(uuid, text, text), reader_of(uuid) to wiretag_app;
  `);
}

/** Drops the exchange. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop trigger orders_guard_cutting on orders;
    drop function guard_cutting(), reader_of(uuid), close_notice(uuid, text, text), take_notice(uuid),
      tell_address(uuid, uuid, text, text, jsonb), tell_reset(uuid, text, jsonb), tell_shop(uuid, uuid, integer, text, text, text[]);
    drop table clock_legs, idempotency_keys, notices, feed, attachments, thread_reads, messages, events cascade;
    drop function guard_event(), feed_event();
  `);
}
