import QRCode from 'qrcode';
import { openOrder } from '@/app/(workspace)/orders/_components/load';
import { groupSizes } from '@/components/order/sizes-table';
import { linkAddress } from '@/lib/adapters/links';
import { subtract } from '@/lib/domain/quantity/length';
import { printNear } from '@/lib/domain/quantity/print-length';
import { sayDay } from '@/lib/forms/say';

export const metadata = { title: 'Tag' };

interface TagPageProps {
  params: Promise<{ orderId: string }>;
  searchParams: Promise<{ paper?: string }>;
}

/** The tag to wire to the part: exactly one page, 4 × 6 in or A6. */
export default async function TagPage({ params, searchParams }: TagPageProps) {
  const { view } = await openOrder({ params }, () => Promise.resolve(undefined));
  const isA6 = (await searchParams).paper === 'a6';
  const { facts } = view;
  const code = QRCode.create(linkAddress(`/orders/${facts.id}`), { errorCorrectionLevel: 'Q' });
  const groups = groupSizes(facts.sizes);
  const unit = facts.sender.unit;
  const rows = [
    ['To', facts.partner?.name ?? ''],
    ['From', facts.sender.name],
    [
      'Needed back',
      facts.neededBackOn === null ? '' : sayDay(facts.neededBackOn, new Date().getUTCFullYear()),
    ],
  ];
  return (
    <main className={`print-tag ${isA6 ? 'print-a6' : 'print-4x6'}`}>
      <div className="border-black mx-auto mb-2 size-8 rounded-full border-2 border-dashed" aria-hidden />
      <h1 className="text-center font-stencil text-[54px] leading-none font-extrabold">WO {facts.number}</h1>
      <p className="mb-2 text-center text-[15px]">
        {facts.parts
          .map(
            (part) =>
              `${part.pieces} ${part.kind}${part.stamps.length > 0 ? `, stamp ${part.stamps.join(' ')}` : ''}`,
          )
          .join('; ')}
      </p>
      {rows.map(([label, value]) => (
        <p key={label} className="border-black flex justify-between border-t py-1 text-sm">
          <span className="text-xs">{label}</span>
          <span>{value}</span>
        </p>
      ))}
      <div className="border-black border-t-[3px] pt-2">
        {facts.latestRev === null ? (
          <p className="py-3 text-center text-[26px] font-bold">NO SIZES YET</p>
        ) : (
          <>
            <p className="text-[13px]">
              Sizes rev <b className="num text-xl">{facts.latestRev}</b>, finished. Check on screen before
              cutting
            </p>
            <table className="mt-1 w-full text-[14px]">
              <tbody>
                {groups.slice(0, 6).map((group) => (
                  <tr key={group.key}>
                    <td>
                      {group.what} {group.features}
                    </td>
                    <td className="num text-right text-[22px] font-bold">{printNear(group.target, unit)}</td>
                    <td className="num text-right text-xs">
                      {printNear(subtract(group.upper, group.target), unit, { signed: true })}
                      <br />
                      {printNear(subtract(group.lower, group.target), unit, { signed: true }).replace(
                        '+.0000',
                        '−.0000',
                      )}
                    </td>
                  </tr>
                ))}
              </tbody>
            </table>
            {groups.length > 6 && <p className="text-xs">and {groups.length - 6} more: on screen</p>}
          </>
        )}
      </div>
      <div className="absolute inset-x-[0.2in] bottom-[0.2in] flex items-end gap-3">
        <QrPicture code={code} />
        <p className="text-[12px] leading-snug">
          Scan to check the part in, repeat the sizes back or post readings. A tag with an older rev is void.
        </p>
      </div>
    </main>
  );
}

/** The code as one path: modules of 0.4 mm or more, with the quiet zone of four. */
function QrPicture({ code }: { code: QRCode.QRCode }) {
  const { size, data } = code.modules;
  const path = Array.from({ length: size * size }, (_module, index) => index)
    .filter((index) => data[index])
    .map((index) => `M${(index % size) + 4} ${Math.floor(index / size) + 4}h1v1h-1z`)
    .join('');
  return (
    <svg
      viewBox={`0 0 ${size + 8} ${size + 8}`}
      className="size-[1.25in] shrink-0"
      role="img"
      aria-label="QR code of the order"
      shapeRendering="crispEdges"
    >
      <rect width={size + 8} height={size + 8} fill="#fff" />
      <path d={path} fill="#000" />
    </svg>
  );
}
