import type { Knex } from 'knex';

/** What the frame around every page shows, in one statement with the question who is asking. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    -- With the rights of the caller: what it reads, it reads under the policies that app_begin has just set the scene for.
    create function app_shell(hash text) returns json language plpgsql set search_path = public, pg_temp as $$
    declare asker app_asker := app_begin(hash);
    begin
      if asker.person_id is null then return null; end if;
      return json_build_object('asker', row_to_json(asker),
        'shops', coalesce((select json_agg(json_build_object('id', s.shop_id, 'name', s.name)) from shops_of_asker() s), '[]'),
        'colleagues', coalesce((select json_agg(json_build_object('id', p.id, 'name', p.name) order by p.name)
          from memberships m join people p on p.id = m.person_id
          where m.shop_id = asker.shop_id and m.ended_at is null and p.id <> asker.person_id), '[]'));
    end $$;
    revoke all on function app_shell(text) from public;
    grant execute on function app_shell(text) to wiretag_app;
  `);
}

/** Drops it. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop function app_shell(text)');
}
