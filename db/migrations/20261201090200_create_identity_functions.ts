import type { Knex } from 'knex';

/**
 * The doors of identity. Each is security definer with a pinned search path; tests/integration/catalogue lists
 * them all. Nothing else lets the application read a password hash, a token or another shop's people.
 */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create type app_asker as (
      person_id uuid, person_name text, shop_id uuid, shop_name text, roles text[], unit text, currency text, time_zone text
    );

    create function app_set(person uuid, shop uuid) returns app_asker
      language plpgsql security definer set search_path = public, pg_temp as $$
    declare asker app_asker;
    begin
      select p.id, p.name, s.id, s.name, m.roles, s.unit, s.currency, s.time_zone into asker
      from people p join memberships m on m.person_id = p.id and m.ended_at is null
      join shops s on s.id = m.shop_id
      where p.id = person and s.id = shop and p.disabled_at is null;
      if asker.person_id is not null then
        perform set_config('app.person_id', asker.person_id::text, true),
          set_config('app.shop_id', asker.shop_id::text, true), set_config('app.only_order', '', true);
      end if;
      return asker;
    end $$;

    create function app_begin(hash text) returns app_asker
      language plpgsql security definer set search_path = public, pg_temp as $$
    declare found_in sign_ins;
    begin
      perform set_config('app.person_id', '', true), set_config('app.shop_id', '', true), set_config('app.only_order', '', true);
      select * into found_in from sign_ins
        where token_hash = hash and ended_at is null and idle_until > now() and until > now();
      if found_in.id is null then return null; end if;
      if found_in.seen_at < now() - interval '5 minutes' and not pg_is_in_recovery() then
        update sign_ins set seen_at = now(), idle_until = least(until, now() + interval '14 hours') where id = found_in.id;
      end if;
      return app_set(found_in.person_id, found_in.shop_id);
    end $$;
    comment on function app_begin(text) is 'First statement of each transaction: checks the sign-in, sets who is asking.';

    create function app_begin_for(shop uuid, person uuid) returns app_asker
      language sql security definer set search_path = public, pg_temp as $$ select app_set(person, shop) $$;
    comment on function app_begin_for(uuid, uuid) is 'The same for background tasks, which act for one person in one shop.';

    create function find_for_sign_in(email text) returns table (person_id uuid, password_hash text, shop_id uuid)
      language sql stable security definer set search_path = public, pg_temp as $$
      select p.id, p.password_hash, (select m.shop_id from memberships m join shops s on s.id = m.shop_id
        where m.person_id = p.id and m.ended_at is null order by m.created_at, m.id limit 1)
      from people p where p.email_norm = email and p.disabled_at is null $$;

    create function find_colleague_for_sign_in(hash text, person uuid) returns table (person_id uuid, password_hash text, shop_id uuid)
      language sql stable security definer set search_path = public, pg_temp as $$
      select p.id, p.password_hash, s.shop_id
      from sign_ins s join memberships m on m.shop_id = s.shop_id and m.ended_at is null
      join people p on p.id = m.person_id
      where s.token_hash = hash and s.ended_at is null and s.until > now() and p.id = person and p.disabled_at is null $$;

    create function start_sign_in(sign_in uuid, hash text, person uuid, shop uuid, device text) returns boolean
      language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if not exists (select 1 from memberships m join people p on p.id = m.person_id
        where m.person_id = person and m.shop_id = shop and m.ended_at is null and p.disabled_at is null)
      then return false; end if;
      insert into sign_ins (id, token_hash, person_id, shop_id, idle_until, until, agent)
        values (sign_in, hash, person, shop, now() + interval '14 hours', now() + interval '30 days', left(device, 200));
      return true;
    end $$;

    create function end_sign_in(hash text) returns void
      language sql security definer set search_path = public, pg_temp as $$
      update sign_ins set ended_at = now() where token_hash = hash and ended_at is null $$;

    create function shops_of_asker() returns table (shop_id uuid, name text, roles text[])
      language sql stable security definer set search_path = public, pg_temp as $$
      select s.id, s.name, m.roles from memberships m join shops s on s.id = m.shop_id
      where m.person_id = app_person() and m.ended_at is null order by s.name, s.id $$;

    create function switch_shop(hash text, shop uuid) returns boolean
      language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      update sign_ins s set shop_id = shop where s.token_hash = hash and s.ended_at is null and s.until > now()
        and exists (select 1 from memberships m where m.person_id = s.person_id and m.shop_id = shop and m.ended_at is null);
      return found;
    end $$;

    create function note_access(what text, person uuid, shop uuid, address text, went_well boolean) returns void
      language sql security definer set search_path = public, pg_temp as $$
      insert into access_log (kind, person_id, shop_id, from_address, ok) values (what, person, shop, left(address, 60), went_well) $$;

    -- One row a key: counts tries in a window and says whether this one is within the limit.
    create function take_try(limit_key text, most integer, window_seconds integer) returns boolean
      language plpgsql security definer set search_path = public, pg_temp as $$
    declare used integer;
    begin
      insert into rate_limits as r (key, points, until)
        values (limit_key, 1, now() + make_interval(secs => window_seconds))
      on conflict (key) do update set
        points = case when r.until <= now() then 1 else r.points + 1 end,
        until = case when r.until <= now() then excluded.until else r.until end
      returning points into used;
      return used <= most;
    end $$;

    create function begin_reset(reset uuid, email text, hash text) returns uuid
      language plpgsql security definer set search_path = public, pg_temp as $$
    declare person uuid;
    begin
      select id into person from people where email_norm = email and disabled_at is null;
      if person is null then return null; end if;
      insert into password_resets (id, person_id, token_hash, until) values (reset, person, hash, now() + interval '1 hour');
      return person;
    end $$;

    create function take_reset(hash text, new_password_hash text) returns uuid
      language plpgsql security definer set search_path = public, pg_temp as $$
    declare person uuid;
    begin
      update password_resets set used_at = now() where token_hash = hash and used_at is null and until > now()
        returning person_id into person;
      if person is null then return null; end if;
      update people set password_hash = new_password_hash where id = person;
      update sign_ins set ended_at = now() where person_id = person and ended_at is null;
      update password_resets set used_at = now() where person_id = person and used_at is null;
      return person;
    end $$;

    create function read_invitation(hash text) returns table (shop_name text, inviting_shop_name text, email_norm text, known boolean)
      language sql stable security definer set search_path = public, pg_temp as $$
      select s.name, b.name, i.email_norm, exists (select 1 from people p where p.email_norm = i.email_norm)
      from invitations i join shops s on s.id = i.invited_shop_id join shops b on b.id = i.shop_id
      where i.token_hash = hash and i.used_at is null and i.revoked_at is null and i.until > now() $$;

    -- A new person gets the name and password given; a person already here must have signed in (person not null).
    create function take_invitation(hash text, new_person uuid, person_name text, new_password_hash text, signed_in uuid) returns table (person_id uuid, shop_id uuid)
      language plpgsql security definer set search_path = public, pg_temp as $$
    #variable_conflict use_column
    declare taken invitations; who uuid;
    begin
      update invitations i set used_at = now()
        where i.token_hash = hash and i.used_at is null and i.revoked_at is null and i.until > now() returning * into taken;
      if taken.id is null then return; end if;
      select p.id into who from people p where p.email_norm = taken.email_norm;
      if who is null then
        who := new_person;
        insert into people (id, email_norm, name, password_hash) values (who, taken.email_norm, person_name, new_password_hash);
      elsif who is distinct from signed_in then
        raise exception 'sign in first' using errcode = 'insufficient_privilege';
      end if;
      insert into memberships (person_id, shop_id, roles) values (who, taken.invited_shop_id, taken.roles)
        on conflict (person_id, shop_id) where ended_at is null do update set roles = excluded.roles;
      update shops s set claimed_at = now() where s.id = taken.invited_shop_id and s.claimed_at is null;
      update partnerships p set state = 'active', version = p.version + 1
        where p.state = 'invited' and taken.invited_shop_id in (p.a_shop_id, p.b_shop_id) and taken.shop_id in (p.a_shop_id, p.b_shop_id);
      return query select who, taken.invited_shop_id;
    end $$;

    create function default_hours(shop uuid) returns void
      language sql security definer set search_path = public, pg_temp as $$
      insert into shop_hours (shop_id, weekday, opens, closes) select shop, d, '08:00', '16:00' from generate_series(1, 5) d;
      insert into shop_counters (shop_id) values (shop) $$;

    create function sign_up_shop(shop uuid, shop_name text, shop_unit text, shop_currency text, zone text,
      person uuid, email text, person_name text, new_password_hash text) returns boolean
      language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if exists (select 1 from people where email_norm = email) then return false; end if;
      insert into shops (id, name, unit, currency, time_zone, claimed_at) values (shop, shop_name, shop_unit, shop_currency, zone, now());
      insert into people (id, email_norm, name, password_hash) values (person, email, person_name, new_password_hash);
      insert into memberships (person_id, shop_id, roles) values (person, shop, array['owner', 'bench', 'counter']);
      perform default_hours(shop);
      return true;
    end $$;

    -- A partner that is not here yet: a shop without people, waiting to be claimed, and the partnership with it.
    create function invite_shop(shop uuid, shop_name text) returns void
      language plpgsql security definer set search_path = public, pg_temp as $$
    declare mine shops;
    begin
      select * into mine from shops where id = app_shop();
      if mine.id is null then raise exception 'nobody is asking' using errcode = 'insufficient_privilege'; end if;
      insert into shops (id, name, unit, currency, time_zone) values (shop, shop_name, mine.unit, mine.currency, mine.time_zone);
      insert into partnerships (a_shop_id, b_shop_id, state, invited_by_shop_id)
        values (least(shop, mine.id), greatest(shop, mine.id), 'invited', mine.id);
      perform default_hours(shop);
    end $$;

    create function owner_of_shop(shop uuid) returns uuid
      language sql stable security definer set search_path = public, pg_temp as $$
      select m.person_id from memberships m join people p on p.id = m.person_id
      where m.shop_id = shop and m.ended_at is null and 'owner' = any (m.roles) and p.disabled_at is null order by m.created_at, m.id limit 1 $$;

    create function next_number(kind text) returns integer
      language plpgsql security definer set search_path = public, pg_temp as $$
    declare n integer;
    begin
      if kind = 'order' then
        update shop_counters set order_no = order_no + 1 where shop_id = app_shop() returning order_no into n;
      else
        update shop_counters set build_no = build_no + 1 where shop_id = app_shop() returning build_no into n;
      end if;
      return n;
    end $$;

    revoke all on all functions in schema public from public;
    grant execute on function app_shop(), app_person(), app_only_order(), app_begin(text), app_begin_for(uuid, uuid),
      find_for_sign_in(text), find_colleague_for_sign_in(text, uuid), start_sign_in(uuid, text, uuid, uuid, text), end_sign_in(text), shops_of_asker(),
      switch_shop(text, uuid), note_access(text, uuid, uuid, text, boolean), take_try(text, integer, integer),
      begin_reset(uuid, text, text), take_reset(text, text), read_invitation(text),
      take_invitation(text, uuid, text, text, uuid), sign_up_shop(uuid, text, text, text, text, uuid, text, text, text),
      invite_shop(uuid, text), next_number(text), owner_of_shop(uuid) to wiretag_app;
  `);
}

/** Drops the doors. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop function owner_of_shop(uuid), next_number(text), invite_shop(uuid, text),
      sign_up_shop(uuid, text, text, text, text, uuid, text, text, text), default_hours(uuid),
      take_invitation(text, uuid, text, text, uuid), read_invitation(text), take_reset(text, text),
      begin_reset(uuid, text, text), take_try(text, integer, integer), note_access(text, uuid, uuid, text, boolean),
      switch_shop(text, uuid), shops_of_asker(), end_sign_in(text), start_sign_in(uuid, text, uuid, uuid, text),
      find_colleague_for_sign_in(text, uuid), find_for_sign_in(text), app_begin_for(uuid, uuid), app_begin(text), app_set(uuid, uuid);
    drop type app_asker;
  `);
}
