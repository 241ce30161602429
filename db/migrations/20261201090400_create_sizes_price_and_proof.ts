import type { Knex } from 'knex';

/** Revs, repeat-backs, quotes, custody, readings, snags, holds, decisions. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table revs (
      order_id uuid not null references orders (id),
      number integer not null check (number >= 1),
      unit text not null check (unit in ('in', 'mm')),
      reason text not null default '',
      shop_id uuid not null,
      person_id uuid not null references people (id),
      author_name text not null,
      released_at timestamptz not null,
      primary key (order_id, number),
      constraint revs_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index revs_author_idx on revs (shop_id, order_id);
    create index revs_person_id_idx on revs (person_id);
    create table rev_lines (
      order_id uuid not null,
      rev integer not null,
      line_id uuid not null,
      since integer not null,
      source text not null check (source in ('measured', 'book', 'partner_proposes', 'typed')),
      catalogue_version integer not null,
      inputs jsonb not null,
      steps jsonb not null,
      checks jsonb not null,
      typed_reason text not null default '',
      primary key (order_id, rev, line_id),
      constraint rev_lines_rev foreign key (order_id, rev) references revs (order_id, number),
      constraint rev_lines_line foreign key (line_id, order_id) references order_lines (id, order_id),
      constraint rev_lines_since check (since between 1 and rev)
    );
    create index rev_lines_line_idx on rev_lines (line_id, order_id);
    create table rev_sizes (
      order_id uuid not null,
      rev integer not null,
      line_id uuid not null,
      feature text not null,
      what text not null,
      position integer not null,
      cutting text not null check (cutting in ('smaller', 'bigger', 'one_limit')),
      derived_nm bigint,
      target_nm bigint not null,
      lower_nm bigint not null,
      upper_nm bigint not null,
      partner_target_nm bigint,
      partner_lower_nm bigint,
      partner_upper_nm bigint,
      finish_pm bigint,
      primary key (order_id, rev, line_id, feature, what),
      constraint rev_sizes_line foreign key (order_id, rev, line_id) references rev_lines (order_id, rev, line_id),
      constraint rev_sizes_ordered check (lower_nm <= target_nm and target_nm <= upper_nm),
      constraint rev_sizes_partner_inside check (partner_target_nm is null or (
        lower_nm <= partner_lower_nm and partner_lower_nm <= partner_target_nm
        and partner_target_nm <= partner_upper_nm and partner_upper_nm <= upper_nm))
    );
    create table repeat_backs (
      id uuid primary key,
      order_id uuid not null references orders (id),
      since integer not null,
      line_id uuid not null,
      what text not null,
      lower_nm bigint not null,
      upper_nm bigint not null,
      keyed_lower_text text not null,
      keyed_upper_text text not null,
      keyed_lower_nm bigint not null,
      keyed_upper_nm bigint not null,
      unit text not null check (unit in ('in', 'mm')),
      matches boolean not null,
      shop_id uuid not null,
      person_id uuid not null references people (id),
      author_name text not null,
      at timestamptz not null,
      constraint repeat_backs_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id),
      constraint repeat_backs_line foreign key (line_id, order_id) references order_lines (id, order_id)
    );
    create unique index repeat_backs_match_idx on repeat_backs (order_id, since, line_id, what, lower_nm, upper_nm) where matches;
    create index repeat_backs_order_id_idx on repeat_backs (order_id, line_id);
    create index repeat_backs_author_idx on repeat_backs (shop_id, order_id);
    create index repeat_backs_person_id_idx on repeat_backs (person_id);
    create index repeat_backs_line_idx on repeat_backs (line_id, order_id);

    create table quotes (
      order_id uuid not null references orders (id),
      revision integer not null check (revision >= 1),
      kind text not null check (kind in ('inspection', 'work', 'settlement')),
      currency char(3) not null,
      extras jsonb not null default '[]',
      extras_minor bigint not null default 0,
      tax_minor bigint not null default 0,
      total_minor bigint not null,
      promised_on date,
      promise_days integer check (promise_days > 0),
      valid_until date,
      note text not null default '',
      shop_id uuid not null,
      person_id uuid not null references people (id),
      author_name text not null,
      at timestamptz not null,
      primary key (order_id, revision),
      constraint quotes_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id),
      constraint quotes_amounts check (total_minor >= 0 and tax_minor >= 0)
    );
    create index quotes_author_idx on quotes (shop_id, order_id);
    create index quotes_person_id_idx on quotes (person_id);
    create table quote_lines (
      order_id uuid not null,
      revision integer not null,
      line_id uuid not null,
      amount_minor bigint not null check (amount_minor >= 0),
      primary key (order_id, revision, line_id),
      constraint quote_lines_quote foreign key (order_id, revision) references quotes (order_id, revision),
      constraint quote_lines_line foreign key (line_id, order_id) references order_lines (id, order_id)
    );
    create index quote_lines_line_idx on quote_lines (line_id, order_id);
    create table quote_answers (
      id uuid primary key,
      order_id uuid not null,
      revision integer not null,
      kind text not null check (kind in ('inspection', 'work', 'settlement')),
      answer text not null check (answer in ('ask', 'turn_down', 'agree', 'void', 'expired')),
      note text not null default '',
      shop_id uuid not null,
      person_id uuid references people (id),
      author_name text not null,
      at timestamptz not null,
      constraint quote_answers_quote foreign key (order_id, revision) references quotes (order_id, revision),
      constraint quote_answers_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create unique index quote_answers_one_agreed_idx on quote_answers (order_id, kind) where answer = 'agree';
    create index quote_answers_quote_idx on quote_answers (order_id, revision);
    create index quote_answers_author_idx on quote_answers (shop_id, order_id);
    create index quote_answers_person_id_idx on quote_answers (person_id);

    create table custody_moves (
      id uuid primary key,
      shop_id uuid not null,
      order_id uuid not null references orders (id),
      part_id uuid not null,
      kind text not null check (kind in ('sent', 'checked_in', 'sent_back', 'received')),
      pieces integer not null check (pieces > 0),
      stamps text[] not null default '{}',
      carrier text not null default '',
      condition text not null default '',
      kit text[] not null default '{}',
      person_id uuid not null references people (id),
      author_name text not null,
      occurred_at timestamptz not null,
      recorded_at timestamptz not null default now(),
      replaces_id uuid references custody_moves (id),
      constraint custody_moves_replaces unique (replaces_id),
      constraint custody_moves_part foreign key (order_id, part_id) references order_parts (order_id, part_id),
      constraint custody_moves_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index custody_moves_order_idx on custody_moves (order_id, part_id);
    create index custody_moves_part_id_idx on custody_moves (part_id);
    create index custody_moves_author_idx on custody_moves (shop_id, order_id);
    create index custody_moves_person_id_idx on custody_moves (person_id);
    create table part_places (
      part_id uuid not null references parts (id),
      shop_id uuid not null references shops (id),
      place text not null check (place in ('partner', 'road_out', 'road_back', 'home')),
      order_id uuid references orders (id),
      pieces integer not null check (pieces >= 0),
      constraint part_places_key unique nulls not distinct (part_id, place, order_id)
    );
    comment on column part_places.shop_id is 'The shop the part belongs to.';
    create index part_places_order_id_idx on part_places (order_id);
    create index part_places_shop_id_idx on part_places (shop_id);

    create table instruments (
      id uuid primary key,
      shop_id uuid not null references shops (id),
      name text not null check (name <> ''),
      kind text not null,
      resolution_nm bigint check (resolution_nm > 0),
      uncertainty_nm bigint check (uncertainty_nm > 0),
      retired_at timestamptz,
      version integer not null default 1
    );
    create index instruments_shop_id_idx on instruments (shop_id);
    create table readings (
      id uuid primary key,
      order_id uuid not null,
      line_id uuid not null,
      shop_id uuid not null,
      purpose text not null check (purpose in ('found', 'cut', 'check')),
      round integer not null,
      stage text not null check (stage in ('found', 'cut', 'finished')),
      rev integer,
      feature text not null,
      position text not null,
      typed_text text not null,
      unit text not null check (unit in ('in', 'mm')),
      set_to_nm bigint,
      away_nm bigint check (away_nm >= 0),
      side text check (side in ('smaller', 'on', 'bigger')),
      size_nm bigint not null,
      part_mc integer,
      gauge_mc integer,
      instrument_id uuid references instruments (id),
      instrument_words text not null default '',
      marks text[] not null default '{}',
      person_id uuid not null references people (id),
      author_name text not null,
      taken_at timestamptz not null,
      recorded_at timestamptz not null default now(),
      replaces_id uuid references readings (id),
      constraint readings_replaces unique (replaces_id),
      constraint readings_line foreign key (line_id, order_id) references order_lines (id, order_id),
      constraint readings_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id),
      constraint readings_comparator check (
        (side is null and set_to_nm is null and away_nm is null)
        or (side is not null and set_to_nm is not null and away_nm is not null and size_nm = set_to_nm
          + case side when 'smaller' then -away_nm when 'bigger' then away_nm else 0 end
          and (side <> 'on' or away_nm = 0)))
    );
    create index readings_order_idx on readings (order_id, line_id, round);
    create index readings_line_idx on readings (line_id, order_id);
    create index readings_author_idx on readings (shop_id, order_id);
    create index readings_person_id_idx on readings (person_id);
    create index readings_instrument_id_idx on readings (instrument_id);

    create table snags (
      id uuid primary key,
      order_id uuid not null references orders (id),
      line_id uuid,
      feature text,
      round integer not null,
      kind text not null,
      words text not null,
      proposal text not null,
      price_minor bigint not null default 0,
      days integer not null default 0 check (days >= 0),
      state text not null check (state in ('raised', 'asked', 'approved', 'declined', 'settled')),
      sizes_due boolean not null default false,
      shop_id uuid not null,
      person_id uuid not null references people (id),
      author_name text not null,
      at timestamptz not null,
      version integer not null default 1,
      constraint snags_line foreign key (line_id, order_id) references order_lines (id, order_id),
      constraint snags_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index snags_order_id_idx on snags (order_id);
    create index snags_line_idx on snags (line_id, order_id);
    create index snags_author_idx on snags (shop_id, order_id);
    create index snags_person_id_idx on snags (person_id);
    create table snag_answers (
      id uuid primary key,
      snag_id uuid not null references snags (id),
      order_id uuid not null,
      answer text not null check (answer in ('approve', 'ask', 'reply', 'decline_carry_on', 'decline_stop')),
      words text not null default '',
      shop_id uuid not null,
      person_id uuid not null references people (id),
      author_name text not null,
      at timestamptz not null,
      constraint snag_answers_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index snag_answers_snag_id_idx on snag_answers (snag_id);
    create index snag_answers_author_idx on snag_answers (shop_id, order_id);
    create index snag_answers_order_idx on snag_answers (order_id);
    create index snag_answers_person_id_idx on snag_answers (person_id);
    create table holds (
      id uuid primary key,
      order_id uuid not null references orders (id),
      line_id uuid,
      reason text not null check (reason in ('sizes', 'parts', 'decision', 'machine', 'other')),
      words text not null,
      waits_for text not null check (waits_for in ('sender', 'partner')),
      placed_by text not null check (placed_by in ('sender', 'partner')),
      placed_at timestamptz not null,
      answered_at timestamptz,
      lifted_at timestamptz,
      shop_id uuid not null,
      person_id uuid not null references people (id),
      author_name text not null,
      constraint holds_line foreign key (line_id, order_id) references order_lines (id, order_id),
      constraint holds_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index holds_order_id_idx on holds (order_id) where lifted_at is null;
    create index holds_line_idx on holds (line_id, order_id);
    create index holds_author_idx on holds (shop_id, order_id);
    create index holds_person_id_idx on holds (person_id);
    create table line_decisions (
      order_id uuid not null,
      line_id uuid not null,
      round integer not null,
      decision text not null check (decision in ('accept', 'as_is', 'send_back', 'reject')),
      reason text not null default '',
      features text[] not null default '{}',
      shop_id uuid not null,
      person_id uuid not null references people (id),
      author_name text not null,
      at timestamptz not null,
      primary key (order_id, line_id, round),
      constraint line_decisions_line foreign key (line_id, order_id) references order_lines (id, order_id),
      constraint line_decisions_author foreign key (shop_id, order_id) references order_sides (shop_id, order_id)
    );
    create index line_decisions_line_idx on line_decisions (line_id, order_id);
    create index line_decisions_author_idx on line_decisions (shop_id, order_id);
    create index line_decisions_person_id_idx on line_decisions (person_id);

    do $$ declare t text; begin
      foreach t in array array['revs', 'rev_lines', 'rev_sizes', 'repeat_backs', 'quotes', 'quote_lines', 'quote_answers', 'custody_moves',
        'readings', 'snags', 'snag_answers', 'holds', 'line_decisions'] loop
        call guard_table(t); call let_parties(t);
        execute format('grant select, insert on %I to wiretag_app', t);
      end loop;
      foreach t in array array['revs', 'rev_lines', 'rev_sizes', 'repeat_backs', 'quotes', 'quote_lines', 'quote_answers', 'custody_moves',
        'readings', 'snag_answers', 'line_decisions'] loop
        call make_append_only(t);
      end loop;
    end $$;
    grant update (state, sizes_due, version) on snags to wiretag_app;
    grant update (waits_for, answered_at, lifted_at) on holds to wiretag_app;
    call guard_table('instruments'); call let_shop_only('instruments');
    create policy instruments_partner on instruments for select to wiretag_app using (exists (
      select 1 from partnerships p where (select app_shop()) in (p.a_shop_id, p.b_shop_id) and instruments.shop_id in (p.a_shop_id, p.b_shop_id)));
    grant select, insert, update (name, kind, resolution_nm, uncertainty_nm, retired_at, version) on instruments to wiretag_app;
    call guard_table('part_places');
    create policy part_places_owner_shop on part_places for select to wiretag_app using (shop_id = (select app_shop()));
    create policy part_places_party on part_places for select to wiretag_app using (order_id is not null and exists (
      select 1 from order_sides s where s.order_id = part_places.order_id and s.shop_id = (select app_shop())));
    grant select on part_places to wiretag_app;

    -- Where the pieces are: kept by the database from the moves, and never more or fewer than there are.
    create function place_new_part() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      insert into part_places (part_id, shop_id, place, order_id, pieces) values (new.id, new.shop_id, 'home', null, new.pieces)
      on conflict (part_id, place, order_id) do update set pieces = part_places.pieces + new.pieces - old.pieces;
      return null;
    end $$;
    create trigger parts_place after insert or update of pieces on parts for each row execute function place_new_part();

    create function shift_pieces(part uuid, from_place text, from_order uuid, to_place text, to_order uuid, n integer) returns void
      language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      update part_places set pieces = pieces - n
        where part_id = part and place = from_place and order_id is not distinct from from_order and pieces >= n;
      if not found then
        raise exception 'there are not so many pieces there' using errcode = 'check_violation', constraint = 'part_places_enough';
      end if;
      insert into part_places (part_id, shop_id, place, order_id, pieces)
        select part, p.shop_id, to_place, to_order, n from parts p where p.id = part
      on conflict (part_id, place, order_id) do update set pieces = part_places.pieces + n;
    end $$;
    create function apply_move(m custody_moves, direction integer) returns void
      language plpgsql security definer set search_path = public, pg_temp as $$
    declare from_place text; to_place text;
    begin
      from_place := case m.kind when 'sent' then 'home' when 'checked_in' then 'road_out' when 'sent_back' then 'partner' else 'road_back' end;
      to_place := case m.kind when 'sent' then 'road_out' when 'checked_in' then 'partner' when 'sent_back' then 'road_back' else 'home' end;
      if direction > 0 then
        perform shift_pieces(m.part_id, from_place, case when from_place = 'home' then null else m.order_id end,
          to_place, case when to_place = 'home' then null else m.order_id end, m.pieces);
      else
        perform shift_pieces(m.part_id, to_place, case when to_place = 'home' then null else m.order_id end,
          from_place, case when from_place = 'home' then null else m.order_id end, m.pieces);
      end if;
    end $$;
    create function follow_move() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    declare old_move custody_moves;
    begin
      if new.replaces_id is not null then
        select * into old_move from custody_moves where id = new.replaces_id;
        if old_move.order_id <> new.order_id or old_move.part_id <> new.part_id or old_move.kind <> new.kind then
          raise exception 'a correction names an entry of the same part and kind' using errcode = 'check_violation', constraint = 'custody_moves_same';
        end if;
        perform apply_move(old_move, -1);
      end if;
      perform apply_move(new, 1);
      return null;
    end $$;
    create trigger custody_moves_follow after insert on custody_moves for each row execute function follow_move();

    create function guard_reading() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if new.replaces_id is not null and not exists (select 1 from readings r where r.id = new.replaces_id and r.order_id = new.order_id
        and r.line_id = new.line_id and r.feature = new.feature and r.position = new.position and r.shop_id = new.shop_id)
      then raise exception 'a correction names a reading of the same place' using errcode = 'check_violation', constraint = 'readings_same_place'; end if;
      return new;
    end $$;
    create trigger readings_guard before insert on readings for each row execute function guard_reading();

    -- Revs run without gap; a match has exactly the rev's limits, or the partner's figures of the same size.
    create function guard_rev() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if new.number <> 1 + coalesce((select max(number) from revs where order_id = new.order_id), 0)
      then raise exception 'revs run 1, 2, 3' using errcode = 'check_violation', constraint = 'revs_no_gap'; end if;
      return new;
    end $$;
    create trigger revs_guard before insert on revs for each row execute function guard_rev();
    create function guard_repeat_back() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if new.matches and not exists (select 1 from rev_sizes z join rev_lines l using (order_id, rev, line_id)
        where z.order_id = new.order_id and z.line_id = new.line_id and l.since = new.since and z.lower_nm = new.lower_nm and z.upper_nm = new.upper_nm
          and ((z.lower_nm = new.keyed_lower_nm and z.upper_nm = new.keyed_upper_nm)
            or (z.partner_lower_nm = new.keyed_lower_nm and z.partner_upper_nm = new.keyed_upper_nm)))
      then raise exception 'a match equals the rev' using errcode = 'check_violation', constraint = 'repeat_backs_equal'; end if;
      return new;
    end $$;
    create trigger repeat_backs_guard before insert on repeat_backs for each row execute function guard_repeat_back();

    create function check_quote_total() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      if new.total_minor <> new.extras_minor + new.tax_minor
        + coalesce((select sum(amount_minor) from quote_lines q where q.order_id = new.order_id and q.revision = new.revision), 0)
      then raise exception 'a total is the sum of its lines' using errcode = 'check_violation', constraint = 'quotes_total'; end if;
      return null;
    end $$;
    create constraint trigger quotes_total after insert on quotes deferrable initially deferred for each row execute function check_quote_total();
    revoke all on all functions in schema public from public;
  `);
}

/** Drops sizes, price and proof. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table line_decisions, holds, snag_answers, snags, readings, instruments, part_places, custody_moves, quote_answers,
      quote_lines, quotes, repeat_backs, rev_sizes, rev_lines, revs cascade;
    drop trigger parts_place on parts;
    drop function check_quote_total(), guard_repeat_back(), guard_rev(), guard_reading(), follow_move(),
      shift_pieces(uuid, text, uuid, text, uuid, integer), place_new_part();
  `);
}
