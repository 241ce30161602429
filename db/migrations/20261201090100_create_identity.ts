import type { Knex } from 'knex';

/** People, shops, memberships, sign-ins, invitations, partnerships. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table people (
      id uuid primary key,
      email_norm text not null,
      name text not null check (name <> ''),
      password_hash text,
      disabled_at timestamptz,
      created_at timestamptz not null default now(),
      constraint people_email_norm_key unique (email_norm)
    );
    create table shops (
      id uuid primary key,
      name text not null check (name <> ''),
      unit text not null check (unit in ('in', 'mm')),
      currency char(3) not null,
      time_zone text not null,
      claimed_at timestamptz,
      contact jsonb not null default '{}',
      house jsonb not null default '{}',
      version integer not null default 1,
      created_at timestamptz not null default now()
    );
    create table sign_ins (
      id uuid primary key,
      token_hash text not null,
      person_id uuid not null references people (id),
      shop_id uuid references shops (id),
      started_at timestamptz not null default now(),
      seen_at timestamptz not null default now(),
      idle_until timestamptz not null,
      until timestamptz not null,
      ended_at timestamptz,
      agent text not null default '',
      constraint sign_ins_token_hash_key unique (token_hash)
    );
    create index sign_ins_person_id_idx on sign_ins (person_id) where ended_at is null;
    create index sign_ins_shop_id_idx on sign_ins (shop_id);

    create table shop_hours (
      id uuid primary key default gen_random_uuid(),
      shop_id uuid not null references shops (id),
      weekday smallint not null check (weekday between 1 and 7),
      opens time not null,
      closes time not null,
      constraint shop_hours_forward check (opens < closes)
    );
    create index shop_hours_shop_id_idx on shop_hours (shop_id);
    create table shop_closed_days (
      shop_id uuid not null references shops (id),
      day date not null,
      note text not null default '',
      primary key (shop_id, day)
    );
    create table shop_counters (
      shop_id uuid primary key references shops (id),
      order_no integer not null default 1000,
      build_no integer not null default 100,
      feed_seq bigint not null default 0
    );
    create table memberships (
      id uuid primary key default gen_random_uuid(),
      person_id uuid not null references people (id),
      shop_id uuid not null references shops (id),
      roles text[] not null,
      created_at timestamptz not null default now(),
      ended_at timestamptz,
      constraint memberships_roles check (roles <@ array['owner', 'bench', 'counter'] and cardinality(roles) > 0)
    );
    create unique index memberships_one_open_idx on memberships (person_id, shop_id) where ended_at is null;
    create index memberships_shop_id_idx on memberships (shop_id);

    create table partnerships (
      id uuid primary key default gen_random_uuid(),
      a_shop_id uuid not null references shops (id),
      b_shop_id uuid not null references shops (id),
      state text not null check (state in ('invited', 'active', 'paused', 'ended')),
      invited_by_shop_id uuid not null references shops (id),
      guard_band_nm bigint check (guard_band_nm >= 0),
      version integer not null default 1,
      created_at timestamptz not null default now(),
      constraint partnerships_ordered check (a_shop_id < b_shop_id),
      constraint partnerships_pair unique (a_shop_id, b_shop_id)
    );
    create index partnerships_b_shop_id_idx on partnerships (b_shop_id);
    create index partnerships_invited_by_shop_id_idx on partnerships (invited_by_shop_id);
    create table partner_notes (
      shop_id uuid not null references shops (id),
      partner_shop_id uuid not null references shops (id),
      text text not null,
      version integer not null default 1,
      primary key (shop_id, partner_shop_id)
    );
    create index partner_notes_partner_shop_id_idx on partner_notes (partner_shop_id);
    create table invitations (
      id uuid primary key,
      shop_id uuid not null references shops (id),
      invited_shop_id uuid not null references shops (id),
      email_norm text not null,
      roles text[] not null check (roles <@ array['owner', 'bench', 'counter'] and cardinality(roles) > 0),
      token_hash text not null,
      until timestamptz not null,
      used_at timestamptz,
      revoked_at timestamptz,
      created_at timestamptz not null default now(),
      constraint invitations_token_hash_key unique (token_hash)
    );
    comment on column invitations.invited_shop_id is 'The shop one becomes a member of: the same shop, or a partner not here yet.';
    create index invitations_shop_id_idx on invitations (shop_id);
    create index invitations_invited_shop_id_idx on invitations (invited_shop_id);
    create table password_resets (
      id uuid primary key,
      person_id uuid not null references people (id),
      token_hash text not null,
      until timestamptz not null,
      used_at timestamptz,
      constraint password_resets_token_hash_key unique (token_hash)
    );
    create index password_resets_person_id_idx on password_resets (person_id);
    create table access_log (
      id bigint generated always as identity primary key,
      kind text not null,
      person_id uuid references people (id),
      shop_id uuid references shops (id),
      at timestamptz not null default now(),
      from_address text not null default '',
      ok boolean not null
    );
    create index access_log_person_id_idx on access_log (person_id);
    create index access_log_shop_id_idx on access_log (shop_id);
    create table rate_limits (
      key text primary key,
      points integer not null,
      until timestamptz not null
    );

    call guard_table('people'); call guard_table('shops'); call guard_table('sign_ins'); call guard_table('shop_hours');
    call guard_table('shop_closed_days'); call guard_table('shop_counters'); call guard_table('memberships');
    call guard_table('partnerships'); call guard_table('partner_notes'); call guard_table('invitations');
    call guard_table('password_resets'); call guard_table('access_log'); call guard_table('rate_limits');
    call make_append_only('access_log');
    call let_shop_only('shop_hours'); call let_shop_only('shop_closed_days'); call let_shop_only('memberships');
    call let_shop_only('partner_notes'); call let_shop_only('invitations');

    create policy people_self on people to wiretag_app using (id = (select app_person())) with check (id = (select app_person()));
    create policy people_colleagues on people for select to wiretag_app using (exists (
      select 1 from memberships m where m.person_id = people.id and m.shop_id = (select app_shop())));
    create policy sign_ins_own on sign_ins to wiretag_app
      using (person_id = (select app_person())) with check (person_id = (select app_person()));
    create policy partnerships_party on partnerships to wiretag_app
      using ((select app_shop()) in (a_shop_id, b_shop_id)) with check ((select app_shop()) in (a_shop_id, b_shop_id));
    create policy shops_self on shops to wiretag_app
      using (id = (select app_shop())) with check (id = (select app_shop()));
    create policy shops_partners on shops for select to wiretag_app using (exists (
      select 1 from partnerships p
      where (select app_shop()) in (p.a_shop_id, p.b_shop_id) and shops.id in (p.a_shop_id, p.b_shop_id)));
    create policy partner_hours on shop_hours for select to wiretag_app using (exists (
      select 1 from partnerships p
      where (select app_shop()) in (p.a_shop_id, p.b_shop_id) and shop_hours.shop_id in (p.a_shop_id, p.b_shop_id)));
    create policy partner_closed_days on shop_closed_days for select to wiretag_app using (exists (
      select 1 from partnerships p
      where (select app_shop()) in (p.a_shop_id, p.b_shop_id) and shop_closed_days.shop_id in (p.a_shop_id, p.b_shop_id)));

    grant select (id, email_norm, name, disabled_at), update (name) on people to wiretag_app;
    grant select, update (name, unit, currency, time_zone, contact, house, version) on shops to wiretag_app;
    grant select (id, person_id, shop_id, started_at, seen_at, idle_until, until, ended_at, agent), update (ended_at, shop_id) on sign_ins to wiretag_app;
    grant select, insert, delete on shop_hours, shop_closed_days to wiretag_app;
    grant select, insert, update (roles, ended_at) on memberships to wiretag_app;
    grant select, insert, update (state, guard_band_nm, version) on partnerships to wiretag_app;
    grant select, insert, update (text, version) on partner_notes to wiretag_app;
    grant select (id, shop_id, invited_shop_id, email_norm, roles, until, used_at, revoked_at, created_at),
      insert, update (revoked_at) on invitations to wiretag_app;

    -- A shop always has an owner who can sign in.
    create function keep_an_owner() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if exists (select 1 from shops s where s.id = coalesce(new.shop_id, old.shop_id) and s.claimed_at is not null)
         and not exists (select 1 from memberships m join people p on p.id = m.person_id
           where m.shop_id = coalesce(new.shop_id, old.shop_id) and m.ended_at is null and 'owner' = any (m.roles) and p.disabled_at is null)
      then raise exception 'a shop keeps an owner' using errcode = 'check_violation', constraint = 'shops_keep_an_owner';
      end if;
      return null;
    end $$;
    create constraint trigger memberships_keep_an_owner after insert or update or delete on memberships
      deferrable initially deferred for each row execute function keep_an_owner();
  `);
}

/** Drops the identity tables. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table rate_limits, access_log, password_resets, invitations, partner_notes, partnerships, memberships,
      shop_counters, shop_closed_days, shop_hours, sign_ins, shops, people cascade;
    drop function keep_an_owner();
  `);
}
