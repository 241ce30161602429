import type { Knex } from 'knex';

/** Who is asking, and the manners every table shares. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    revoke all on schema public from public;
    grant usage on schema public to wiretag_app;

    create function app_shop() returns uuid language sql stable parallel safe
      as $$ select nullif(current_setting('app.shop_id', true), '')::uuid $$;
    create function app_person() returns uuid language sql stable parallel safe
      as $$ select nullif(current_setting('app.person_id', true), '')::uuid $$;
    create function app_only_order() returns uuid language sql stable parallel safe
      as $$ select nullif(current_setting('app.only_order', true), '')::uuid $$;
    comment on function app_shop() is 'The shop of the transaction''s person; null sees nothing.';
    comment on function app_only_order() is 'The one order a guest link opens; null for members.';

    create function refuse_change() returns trigger language plpgsql as $$
    begin
      raise exception '% is append-only', tg_table_name using errcode = 'restrict_violation';
    end $$;

    -- Every table calls this once: forced row-level security, and a way in for the definer triggers only.
    create procedure guard_table(name text) language plpgsql as $$
    begin
      execute format('alter table %I enable row level security', name);
      execute format('alter table %I force row level security', name);
      execute format('create policy %I on %I to wiretag_owner using (true) with check (true)', name || '_owner', name);
    end $$;

    create procedure make_append_only(name text) language plpgsql as $$
    begin
      execute format(
        'create trigger %I before update or delete or truncate on %I for each statement execute function refuse_change()',
        name || '_append_only', name);
    end $$;

    create procedure let_shop_only(name text) language plpgsql as $$
    begin
      execute format(
        'create policy %I on %I to wiretag_app using (shop_id = (select app_shop())) with check (shop_id = (select app_shop()))',
        name || '_shop', name);
    end $$;
  `);
}

/** Takes the ground away again. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop procedure let_shop_only(text);
    drop procedure make_append_only(text);
    drop procedure guard_table(text);
    drop function refuse_change();
    drop function app_only_order();
    drop function app_person();
    drop function app_shop();
  `);
}
