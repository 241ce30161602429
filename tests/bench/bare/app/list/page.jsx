import { pool, shop } from '../pool';

export const dynamic = 'force-dynamic';

/** Fifty rows of five columns by keyset, as plain as they come. */
export default async function Page() {
  const { rows } = await pool.query({
    name: 'list',
    text: `select order_id, number, title, status, clock_since from order_sides where shop_id = $1 order by number desc, order_id desc limit 50`,
    values: [shop],
  });
  return (
    <table>
      <tbody>
        {rows.map((row) => (
          <tr key={row.order_id}>
            <td>{row.number}</td>
            <td>{row.title}</td>
            <td>{row.status}</td>
            <td>{row.clock_since.toISOString()}</td>
            <td>{row.order_id}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
