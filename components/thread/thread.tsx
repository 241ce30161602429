import type { ReactNode } from 'react';
import { sayEvent } from '@/lib/domain/orders/say-event';
import type { Side } from '@/lib/domain/orders/facts';
import type { LengthUnit } from '@/lib/domain/quantity/length';
import { sayMoment } from '@/lib/forms/say';

interface Entry {
  readonly seq: number;
  readonly type: string;
  readonly payload: Readonly<Record<string, unknown>>;
  readonly author: string;
  readonly shopName: string;
  readonly side: Side;
  readonly at: Date;
  readonly body: string | null;
  readonly isOwn: boolean;
  readonly files: readonly { readonly id: string; readonly name: string; readonly isPicture: boolean }[];
}

interface ThreadProps {
  entries: readonly (Entry & { quietNote?: string | undefined })[];
  /** How far the reader has read. */
  seenSeq: number;
  side: Side;
  unit: LengthUnit;
  timeZone: string;
  children?: ReactNode;
}

/** Messages, with the order's events between them. Ours stand on blue, theirs on brass. */
export function Thread({ entries, seenSeq, side, unit, timeZone, children }: ThreadProps) {
  const fresh = entries.filter((entry) => entry.body !== null && !entry.isOwn && entry.seq > seenSeq);
  return (
    <section className="sheet" aria-label="Messages" id="messages">
      <h2 className="px-4 pt-4 pb-3 text-[17px]">
        Messages
        {fresh.length > 0 && <span className="note font-normal"> {fresh.length} new</span>}
      </h2>
      {/* Turned round, so that the latest is in view without a script. */}
      <div
        className="flex max-h-[34rem] flex-col-reverse overflow-y-auto border-t border-rule-2"
        role="region"
        tabIndex={0}
        aria-label="Messages and events"
      >
        <ol>
          {entries.map((entry) =>
            entry.body === null ? (
              <li
                key={entry.seq}
                className="border-b border-rule-2 bg-granite px-4 py-2 text-[13.5px] text-ink-2"
              >
                {entry.shopName} {sayEvent(entry.type, entry.payload, unit)}
                <Files files={entry.files} />
              </li>
            ) : (
              <li
                key={entry.seq}
                className={`border-b border-l-4 border-rule-2 px-4 py-3 ${entry.side === side ? 'border-l-blue' : 'border-l-brass'}`}
              >
                <p className="flex justify-between gap-3 text-[13px] text-ink-3">
                  <span>
                    {entry.shopName}, {entry.author}
                    {entry.type === 'order.we_spoke' ? ' · we spoke' : ''}
                    {fresh.includes(entry) && <b className="font-semibold text-blue"> · new</b>}
                  </span>
                  <span>{sayMoment(entry.at, timeZone)}</span>
                </p>
                <p className="whitespace-pre-wrap">{entry.body}</p>
                <Files files={entry.files} />
                {entry.quietNote !== undefined && (
                  <p className="mt-1 text-[13.5px] text-tocut">▲ {entry.quietNote}</p>
                )}
              </li>
            ),
          )}
        </ol>
      </div>
      {children !== undefined && <div className="p-4">{children}</div>}
    </section>
  );
}

/** Pictures small, each opening large; other files by name. */
function Files({ files }: { files: Entry['files'] }) {
  if (files.length === 0) return null;
  return (
    <ul className="mt-2 flex flex-wrap gap-2">
      {files.map(({ id, name, isPicture }) => (
        <li key={id}>
          <a href={`/api/v1/files/${id}`} target="_blank" rel="noreferrer">
            {isPicture ? (
              // The small picture comes by a link of one minute, so the framework's own image cache must not hold it.
              <img
                src={`/api/v1/files/${id}?small`}
                alt={name}
                className="max-h-28 border border-rule"
                loading="lazy"
              />
            ) : (
              name
            )}
          </a>
        </li>
      ))}
    </ul>
  );
}
