import pg from 'pg';

export const pool = new pg.Pool({ connectionString: process.env.BARE_DATABASE_URL, max: 20 });
export const shop = process.env.BARE_SHOP;
