import type { Knex } from 'knex';

/**
 * What a party writes, it writes in its own name and on its own side; and the database asks every question again
 * that keeps metal from being cut.
 */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    -- Rows that carry an author are written by that author, signed in, for the shop that acts.
    create procedure let_author_write(name text, only_side text default null) language plpgsql as $$
    begin
      execute format('create policy %I on %I as restrictive for insert to wiretag_app
        with check (shop_id = (select app_shop()) and person_id = (select app_person()))', name || '_author', name);
      if only_side is not null then
        execute format('create policy %I on %I as restrictive for insert to wiretag_app with check (exists (
          select 1 from order_sides s where s.order_id = %I.order_id and s.shop_id = (select app_shop()) and s.side = %L))',
          name || '_side', name, name, only_side);
      end if;
    end $$;
    call let_author_write('revs', 'sender'); call let_author_write('line_decisions', 'sender');
    call let_author_write('quotes', 'partner'); call let_author_write('repeat_backs', 'partner'); call let_author_write('snags', 'partner');
    call let_author_write('quote_answers'); call let_author_write('custody_moves'); call let_author_write('readings');
    call let_author_write('snag_answers'); call let_author_write('holds'); call let_author_write('messages'); call let_author_write('events');

    -- Their parts without an author of their own follow the row they belong to.
    create policy rev_lines_author on rev_lines as restrictive for insert to wiretag_app with check (exists (
      select 1 from revs r where r.order_id = rev_lines.order_id and r.number = rev_lines.rev and r.shop_id = (select app_shop())));
    create policy rev_sizes_author on rev_sizes as restrictive for insert to wiretag_app with check (exists (
      select 1 from revs r where r.order_id = rev_sizes.order_id and r.number = rev_sizes.rev and r.shop_id = (select app_shop())));
    create policy quote_lines_author on quote_lines as restrictive for insert to wiretag_app with check (exists (
      select 1 from quotes q where q.order_id = quote_lines.order_id and q.revision = quote_lines.revision and q.shop_id = (select app_shop())));

    -- Lines and parts come and go with the sender, until the price is agreed.
    create procedure let_sender_list(name text) language plpgsql as $$
    declare mine text := format('exists (select 1 from orders o where o.id = %I.order_id
      and o.sender_shop_id = (select app_shop()) and o.status in (''draft'', ''sent'', ''quoted''))', name);
    begin
      execute format('create policy %I on %I as restrictive for insert to wiretag_app with check (%s)', name || '_listed', name, mine);
      execute format('create policy %I on %I as restrictive for delete to wiretag_app using (%s)', name || '_unlisted', name, mine);
    end $$;
    call let_sender_list('order_lines'); call let_sender_list('order_parts'); call let_sender_list('order_line_parts');

    -- A lent sheet is read and filled in by the other shop, and never thrown away by it.
    drop policy worksheets_lent on worksheets;
    create policy worksheets_lent on worksheets for select to wiretag_app
      using (shared and exists (select 1 from order_sides s where s.order_id = worksheets.order_id and s.shop_id = (select app_shop()))
        and ((select app_only_order()) is null or (select app_only_order()) = order_id));
    create policy worksheets_lent_fill on worksheets for update to wiretag_app
      using (shared and exists (select 1 from order_sides s where s.order_id = worksheets.order_id and s.shop_id = (select app_shop()))
        and ((select app_only_order()) is null or (select app_only_order()) = order_id))
      with check (shared and exists (select 1 from order_sides s where s.order_id = worksheets.order_id and s.shop_id = (select app_shop()))
        and ((select app_only_order()) is null or (select app_only_order()) = order_id));

    -- A link that opens one order opens one order.
    alter policy attachments_mine on attachments
      using (shop_id = (select app_shop()) and ((select app_only_order()) is null or (select app_only_order()) = order_id))
      with check (shop_id = (select app_shop()) and ((select app_only_order()) is null or (select app_only_order()) = order_id));
    alter policy attachments_parties on attachments using (order_id is not null and exists (
      select 1 from order_sides s where s.order_id = attachments.order_id and s.shop_id = (select app_shop()))
      and ((select app_only_order()) is null or (select app_only_order()) = order_id));
    alter policy part_places_party on part_places using (order_id is not null and exists (
      select 1 from order_sides s where s.order_id = part_places.order_id and s.shop_id = (select app_shop()))
      and ((select app_only_order()) is null or (select app_only_order()) = order_id));
    alter policy events_parties on events
      with check (shop_id = (select app_shop()) and (private_to is null or private_to = (select app_shop()))
        and ((select app_only_order()) is null or (select app_only_order()) = order_id));
    alter policy instruments_partner on instruments using (exists (
      select 1 from partnerships p where p.state = 'active'
        and (select app_shop()) in (p.a_shop_id, p.b_shop_id) and instruments.shop_id in (p.a_shop_id, p.b_shop_id)));

    create or replace function tell_address(notice uuid, telling_shop uuid, address text, what text, more jsonb) returns void
      language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if telling_shop is distinct from app_shop() then raise exception 'not your shop' using errcode = 'insufficient_privilege'; end if;
      insert into notices (id, shop_id, email_norm, kind, detail) values (notice, telling_shop, address, what, more);
    end $$;

    -- A match says the words and limits of the rev that stands; nothing older can be repeated back.
    create or replace function guard_repeat_back() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if new.matches and not exists (select 1 from rev_sizes z join rev_lines l using (order_id, rev, line_id)
        where z.order_id = new.order_id and z.line_id = new.line_id and l.since = new.since and z.what = new.what
          and z.rev = (select max(number) from revs where order_id = new.order_id) and z.lower_nm = new.lower_nm and z.upper_nm = new.upper_nm
          and ((z.lower_nm = new.keyed_lower_nm and z.upper_nm = new.keyed_upper_nm)
            or (z.partner_lower_nm = new.keyed_lower_nm and z.partner_upper_nm = new.keyed_upper_nm)))
      then raise exception 'a match equals the rev' using errcode = 'check_violation', constraint = 'repeat_backs_equal'; end if;
      return new;
    end $$;

    create or replace function check_quote_total() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if exists (select 1 from quotes q where q.order_id = new.order_id and q.revision = new.revision and q.total_minor <> q.extras_minor + q.tax_minor
        + coalesce((select sum(l.amount_minor) from quote_lines l where l.order_id = q.order_id and l.revision = q.revision), 0))
      then raise exception 'a total is the sum of its lines' using errcode = 'check_violation', constraint = 'quotes_total'; end if;
      return null;
    end $$;
    create constraint trigger quote_lines_total after insert on quote_lines deferrable initially deferred
      for each row execute function check_quote_total();
    create function guard_quote() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if new.currency <> (select o.currency from orders o where o.id = new.order_id)
      then raise exception 'a price is in the currency of its order' using errcode = 'check_violation', constraint = 'quotes_currency'; end if;
      return new;
    end $$;
    create trigger quotes_guard before insert on quotes for each row execute function guard_quote();

    create function guard_leg() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    declare last_leg clock_legs;
    begin
      select * into last_leg from clock_legs where order_id = new.order_id order by n desc limit 1;
      if new.n <> 1 + coalesce(last_leg.n, 0) or (last_leg.n is not null and (last_leg.ended_at is null or new.started_at < last_leg.ended_at))
      then raise exception 'a leg begins where the last one ended' using errcode = 'check_violation', constraint = 'clock_legs_no_overlap'; end if;
      return new;
    end $$;
    create trigger clock_legs_guard before insert on clock_legs for each row execute function guard_leg();

    -- How many pieces with a stamp are at the machine shop.
    create function stamp_count(of_order uuid, of_part uuid, of_stamp text) returns bigint
      language sql stable security definer set search_path = public, pg_temp as $$
      select coalesce(sum(case m.kind when 'checked_in' then 1 when 'sent_back' then -1 else 0 end), 0)
      from custody_moves m cross join unnest(m.stamps) as seen (stamp)
      where m.order_id = of_order and m.part_id = of_part and seen.stamp = of_stamp
        and not exists (select 1 from custody_moves later where later.replaces_id = m.id) $$;

    -- The questions of the order machine about one line, asked a second time on purpose. The kit is the catalogue's, not the database's.
    create function line_not_clear(asked uuid) returns text language plpgsql stable security definer set search_path = public, pg_temp as $$
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
    create function guard_line_start() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    declare why text := line_not_clear(new.id);
    begin
      if why is not null then
        raise exception 'not clear to cut: %', why using errcode = 'check_violation', constraint = 'orders_clear_to_cut';
      end if;
      return null;
    end $$;
    create constraint trigger order_lines_guard_start after update of started_at on order_lines deferrable initially deferred
      for each row when (old.started_at is null and new.started_at is not null) execute function guard_line_start();
    create or replace function guard_cutting() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    declare line order_lines; why text;
    begin
      if old.status = 'agreed' and new.status = 'cutting'
        and not exists (select 1 from order_lines l where l.order_id = new.id and l.started_at is not null and l.removed_at is null)
      then raise exception 'nothing is on the machine' using errcode = 'check_violation', constraint = 'orders_clear_to_cut'; end if;
      if old.status = 'cutting' and new.status = 'reported' then
        for line in select * from order_lines l where l.order_id = new.id and l.removed_at is null loop
          why := case when line.started_at is null then 'a line was not on the machine' else line_not_clear(line.id) end;
          if why is not null then
            raise exception 'not clear to report: %', why using errcode = 'check_violation', constraint = 'orders_clear_to_cut';
          end if;
        end loop;
      end if;
      return null;
    end $$;
    revoke all on all functions in schema public from public;
  `);
}

/** Takes the policies and questions away again; functions that were only made stricter stay until their tables go. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop trigger order_lines_guard_start on order_lines;
    drop trigger clock_legs_guard on clock_legs;
    drop trigger quotes_guard on quotes;
    drop trigger quote_lines_total on quote_lines;
    drop function guard_line_start(), line_not_clear(uuid), stamp_count(uuid, uuid, text), guard_leg(), guard_quote();
    create or replace function guard_cutting() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
      begin return null; end $$;
    drop policy worksheets_lent_fill on worksheets;
    do $$ declare p record; begin
      for p in select policyname, tablename from pg_policies where schemaname = 'public'
        and policyname ~ '_(author|side|listed|unlisted)$' loop
        execute format('drop policy %I on %I', p.policyname, p.tablename);
      end loop;
    end $$;
    drop procedure let_author_write(text, text);
    drop procedure let_sender_list(text);
  `);
}
