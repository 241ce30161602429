import { pool } from '../../pool';

/** One insert and its commit. */
export async function POST(request) {
  const { text } = await request.json();
  const { rows } = await pool.query({
    name: 'write',
    text: 'insert into bare_writes (text) values ($1) returning id',
    values: [text],
  });
  return Response.json(rows[0], { status: 201 });
}
