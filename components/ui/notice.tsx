import type { ReactNode } from 'react';

const TONES = {
  fine: ['border-insize', 'bg-insize-wash', '●'],
  note: ['border-ink-3', 'bg-granite', '○'],
  warn: ['border-tocut', 'bg-tocut-wash', '▲'],
  refuse: ['border-past', 'bg-past-wash', '■'],
} as const;

/** A sentence that must be read; its tone is carried by shape and words, never by colour alone. */
export function Notice({ tone, children }: { tone: keyof typeof TONES; children: ReactNode }) {
  const [border, wash, mark] = TONES[tone];
  return (
    <p className={`border-l-4 px-3.5 py-2.5 text-[15px] ${border} ${wash}`}>
      <span aria-hidden className="mr-2">
        {mark}
      </span>
      {children}
    </p>
  );
}
