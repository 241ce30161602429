import type { Knex } from 'knex';

/** Somebody whose roles change, or who leaves, signs in anew; and everybody sees where they are signed in. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create function end_sign_ins_of_member() returns trigger language plpgsql security definer set search_path = public, pg_temp as $$
    begin
      update sign_ins set ended_at = now() where person_id = new.person_id and shop_id = new.shop_id and ended_at is null;
      return null;
    end $$;
    create trigger memberships_end_sign_ins after update of roles, ended_at on memberships
      for each row when (old.roles is distinct from new.roles or old.ended_at is distinct from new.ended_at)
      execute function end_sign_ins_of_member();

    create function sign_in_of(hash text) returns uuid language sql stable security definer set search_path = public, pg_temp as $$
      select id from sign_ins where token_hash = hash and person_id = app_person() $$;
    revoke all on function end_sign_ins_of_member(), sign_in_of(text) from public;
    grant execute on function sign_in_of(text) to wiretag_app;
  `);
}

/** Drops both. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop trigger memberships_end_sign_ins on memberships;
    drop function end_sign_ins_of_member(), sign_in_of(text);
  `);
}
