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
  return (
    <li className="mb-3">
      <div className={hot ? 'stub stub-hot' : 'stub'}>
        <span aria-hidden className="stub-eye" />
        <span className="stub-no">{number}</span>
        <span className="stub-words">
          <b>{verb}</b>
          <span className="note">{sub}</span>
          {unread > 0 && (
            <span className="stub-unread">
              {unread} {unread === 1 ? 'new message' : 'new messages'}
            </span>
          )}
        </span>
        <span className="stub-punches">
          <SmallPunches punches={punches} stopped={stopped} />
        </span>
        <span className="stub-when note">
          {when}
          {waiting !== '' && <span className="block">{waiting}</span>}
        </span>
        <span className="stub-press">
          <a href={href} className={hot ? 'btn' : 'btn btn-ghost'}>
            {press}
            <span className="sr-only"> WO {number}</span>
          </a>
        </span>
      </div>
    </li>
  );
}
