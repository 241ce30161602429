import type { Knex } from 'knex';

/** The log keeps what was done beside what is said of it: an order can be rebuilt from its log alone. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    alter table events add column did jsonb not null default '{}';
    comment on column events.did is 'What the order machine decided, as fold() reads it; empty for words only.';

    -- The nightly check goes through the shops one by one, as each one's owner.
    create function shops_to_check() returns table (shop_id uuid, person_id uuid)
      language sql stable security definer set search_path = public, pg_temp as $$
      select s.id, owner_of_shop(s.id) from shops s where s.claimed_at is not null and owner_of_shop(s.id) is not null order by s.id $$;
    revoke all on function shops_to_check() from public;
    grant execute on function shops_to_check() to wiretag_app;
  `);
}

/** Leaves the words. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop function shops_to_check();
    alter table events drop column did;
  `);
}
