'use client';

import { useEffect, useMemo, useRef, useState } from 'react';
import { keepVersion } from '@/components/forms/keep-version';
import { SheetConflict } from '@/components/worksheet/sheet-conflict';
import { SheetAnswer } from '@/components/worksheet/sheet-answer';
import { SheetFields } from '@/components/worksheet/sheet-fields';
import { BlockMap } from '@/components/parts-map/block-map';
import { CrankMap } from '@/components/parts-map/crank-map';
import type { Made } from '@/lib/domain/builds/made';
import { operationByKey } from '@/lib/domain/operations/catalogue';
import { type House, withHouse } from '@/lib/domain/operations/house';
import type { Raw } from '@/lib/domain/operations/fill';
import type { LengthUnit } from '@/lib/domain/quantity/length';
import { workSheet } from '@/lib/domain/sizes/release';

interface WorksheetProps {
  id: string;
  version: number;
  operation: string;
  made: Made;
  unit: LengthUnit;
  raw: Raw;
  /** The defaults of the shop whose order it is. */
  house?: House | undefined;
}

type Saved = 'kept' | 'keeping' | 'stale' | 'waiting' | 'refused';

const WORDS: Readonly<Record<Saved, string>> = {
  kept: 'Kept as you type',
  keeping: 'Keeping …',
  waiting: 'Not kept yet: no connection. What you typed is still here.',
  refused: 'Not kept: this sheet is no longer yours to write on. Load the page again.',
  stale: 'Somebody else wrote on this sheet. What you typed is still here.',
};

/** The sheet of one operation: it works itself out while one types, in the browser, and keeps what was typed. */
export function Worksheet({
  id,
  version: firstVersion,
  operation: key,
  made,
  unit,
  raw: first,
  house,
}: WorksheetProps) {
  const operation = useMemo(() => withHouse(operationByKey(key), house), [key, house]);
  const [raw, setRaw] = useState<Raw>(first);
  const [saved, setSaved] = useState<Saved>('kept');
  const [kept, setKept] = useState<Raw>(first);
  const [theirs, setTheirs] = useState<Theirs>();
  const version = useRef(firstVersion);
  // One save after the other: each carries the version that the one before it made.
  const saves = useRef<Promise<void>>(Promise.resolve());
  const { filled, worked } = useMemo(
    () => workSheet(key, raw, { made, unit, house }),
    [key, raw, made, unit, house],
  );

  const isOpen = raw !== kept && saved !== 'stale';
  useEffect(() => {
    if (!isOpen) return undefined;
    const save = async () => {
      const answer = await keepVersion<Theirs>(
        `/api/v1/worksheets/${id}`,
        version.current,
        JSON.stringify({ raw }),
      );
      if (answer.is !== 'kept') {
        if (answer.is === 'stale') setTheirs(answer.current);
        setSaved(answer.is);
        return;
      }
      version.current = answer.version;
      setKept(raw);
      setSaved('kept');
    };
    const timer = setTimeout(() => {
      saves.current = saves.current.then(save);
    }, 500);
    // Leaving the page keeps what was typed in the last half second too.
    const leave = () => void save();
    window.addEventListener('pagehide', leave);
    return () => {
      clearTimeout(timer);
      window.removeEventListener('pagehide', leave);
    };
  }, [id, raw, isOpen]);

  const settle = (sheet: Raw, stands: Theirs) => {
    version.current = stands.version;
    setKept(stands.raw);
    setRaw(sheet);
    setTheirs(undefined);
    setSaved('kept');
  };
  const set = (path: string, text: string) => setRaw((before) => ({ ...before, [path]: text }));
  return (
    <>
      <p className="note mb-3" aria-live="polite">
        {WORDS[isOpen && saved === 'kept' ? 'keeping' : saved]}
      </p>
      {theirs && (
        <SheetConflict
          operation={operation}
          mine={raw}
          theirs={theirs.raw}
          onKeepMine={() => settle(raw, theirs)}
          onTakeTheirs={() => settle(theirs.raw, theirs)}
        />
      )}
      <div className="grid items-start gap-6 xl:grid-cols-[minmax(0,1fr)_380px]">
        <div className="grid gap-5">
          {operation.part === 'crank' && (
            <CrankMap
              made={made}
              about={key === 'grind_mains' ? 'mains' : key === 'grind_rods' ? 'rods' : 'both'}
            />
          )}
          {operation.part === 'block' && <BlockMap made={made} />}
          <SheetFields operation={operation} made={made} raw={raw} filled={filled} set={set} />
          <ul className="note border-t border-rule pt-3">
            {operation.cautions.map((caution) => (
              <li key={caution}>{caution}</li>
            ))}
          </ul>
          <details className="sheet px-5 py-3">
            <summary className="cursor-pointer font-semibold">How it is measured and worked out</summary>
            <p className="mt-2 max-w-prose">{operation.method}</p>
          </details>
        </div>
        <SheetAnswer worked={worked} filled={filled} unit={unit} />
      </div>
    </>
  );
}

/** A sheet as somebody else has left it. */
interface Theirs {
  readonly version: number;
  readonly raw: Raw;
}
