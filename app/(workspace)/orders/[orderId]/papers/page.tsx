import { openOrder, type OrderPageProps } from '@/app/(workspace)/orders/_components/load';
import { OrderFrame } from '@/app/(workspace)/orders/_components/order-frame';

export const metadata = { title: 'Papers' };

export default async function PapersPage(props: OrderPageProps) {
  const { view, actor } = await openOrder(props, () => Promise.resolve(undefined));
  const id = view.facts.id;
  return (
    <OrderFrame view={view} actor={actor} tab="papers">
      <h2 className="mb-3">Papers</h2>
      <ul className="grid gap-3">
        <li>
          <a href={`/print/order/${id}`} className="btn btn-ghost">
            The order with its sizes and working
          </a>
        </li>
        <li className="flex flex-wrap gap-3">
          <a href={`/print/tag/${id}`} className="btn btn-ghost">
            The tag, 4 × 6 in
          </a>
          <a href={`/print/tag/${id}?paper=a6`} className="btn btn-ghost">
            The tag, A6
          </a>
        </li>
      </ul>
      <p className="note mt-4">
        A printed tag carries its rev. A tag with an older rev is void: check on screen before cutting.
      </p>
    </OrderFrame>
  );
}
