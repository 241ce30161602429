import { type PunchesValue, SmallPunches } from '@/components/tag/punches';

export interface TagStubProps {
  href: string;
  number: number;
  verb: string;
  sub: string;
  when: string;
  waiting: string;
  press: string;
  punches: PunchesValue;
  stopped: boolean;
  hot: boolean;
  /** Messages that the reader has not seen. */
  unread: number;
}

/** An order as a stub of its tag, in a list. Warm when it is the reader's move. */
export function TagStub({
  href,
  number,
  verb,
  sub,
  when,
  waiting,
  press,
  punches,
  stopped,
  hot,
  unread,
}: TagStubProps) {
  const face = hot ? 'bg-manila-2 border-manila-edge' : 'bg-paper border-rule';
  return (
    <li className="mb-3">
      <div
        className={`stub-face grid items-center gap-x-4 gap-y-2 border py-3 pr-4 sm:grid-cols-[52px_84px_minmax(0,1fr)_auto] lg:grid-cols-[52px_92px_minmax(0,1fr)_132px_150px_178px] ${face} grid-cols-[44px_minmax(0,1fr)_auto]`}
      >
        <span aria-hidden className="stub-eye ml-5 max-sm:col-start-1 max-sm:row-start-1" />
        <span className="font-stencil text-[25px] leading-none font-extrabold tracking-wide max-sm:col-start-2 max-sm:row-start-1">
          {number}
        </span>
        <span className="max-sm:col-span-3 max-sm:pl-5">
          <b className="block font-semibold">{verb}</b>
          <span className="note">{sub}</span>
          {unread > 0 && (
            <span className="block text-[14px] font-semibold text-blue">
              {unread} {unread === 1 ? 'new message' : 'new messages'}
            </span>
          )}
        </span>
        <span className="max-sm:col-start-3 max-sm:row-start-1">
          <SmallPunches punches={punches} stopped={stopped} />
        </span>
        <span className="note max-sm:col-span-2 max-sm:pl-5 lg:block">
          {when}
          {waiting !== '' && <span className="block">{waiting}</span>}
        </span>
        <span className="text-right max-sm:justify-self-end">
          <a href={href} className={`btn ${hot ? '' : 'btn-ghost'}`}>
            {press}
            <span className="sr-only"> WO {number}</span>
          </a>
        </span>
      </div>
    </li>
  );
}
