import type { Knex } from 'knex';

/** A message or a reading moves an order's log on and nothing that a list shows: the side rows stay as they are then. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    drop trigger orders_project_sides on orders;
    create trigger orders_project_sides_new after insert on orders for each row execute function project_sides();
    create trigger orders_project_sides after update of partner_shop_id, status, needed_back_on, promised_on, price_punch, parts_punch,
      sizes_punch, stopped, clear, sender_step, partner_step, clock, clock_since, title, words, ended_at, version
      on orders for each row execute function project_sides();
  `);
}

/** Projects on every change again. */
export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop trigger orders_project_sides_new on orders;
    drop trigger orders_project_sides on orders;
    create trigger orders_project_sides after insert or update on orders for each row execute function project_sides();
  `);
}
