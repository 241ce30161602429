import type { ReactNode } from 'react';

interface SheetProps {
  title?: ReactNode;
  note?: ReactNode;
  children: ReactNode;
  id?: string;
}

/** A sheet of paper on the granite. */
export function Sheet({ title, note, children, id }: SheetProps) {
  return (
    <section className="sheet px-5 py-4" id={id}>
      {title !== undefined && <h2 className="text-[17px]">{title}</h2>}
      {note !== undefined && <p className="note mt-0.5">{note}</p>}
      <div className={title === undefined ? '' : 'mt-3'}>{children}</div>
    </section>
  );
}
