import type { Knex } from 'knex';

/** What was typed of a part's temperature, beside the thousandths of a degree that it was read as. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`alter table readings add column part_temperature_text text not null default ''`);
}

/** Drops it. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw('alter table readings drop column part_temperature_text');
}
