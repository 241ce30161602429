import { pool } from '../../pool';

export const dynamic = 'force-dynamic';

/** One prepared point lookup. */
export async function GET(request) {
  const id = new URL(request.url).searchParams.get('id');
  const { rows } = await pool.query({
    name: 'one',
    text: 'select id, number, title, status from orders where id = $1',
    values: [id],
  });
  return Response.json(rows[0]);
}
