'use client';

import { useEffect, useRef, useState } from 'react';

interface AutosaveProps {
  /** Where the form is kept, by PUT. */
  url: string;
  /** The version seen; 0 for something that is made by the first save. */
  version: number;
  /** Fields of which there may be several. */
  lists: readonly string[];
  /** Fields that are not sent. */
  leaveOut?: readonly string[];
}

type Saved = 'kept' | 'keeping' | 'stale' | 'waiting' | 'refused';

const WORDS: Readonly<Record<Saved, string>> = {
  kept: 'Kept as you type.',
  keeping: 'Keeping …',
  waiting: 'Not kept yet: no connection. What you typed is still here.',
  refused: 'Not kept: something here cannot be read. Press the button to see what.',
  stale: 'This was changed on another screen in the meantime. Load the page again to see it.',
};

/** Keeps the form around it while one types, half a second after the last change and when the page is left. */
export function Autosave({ url, version: first, lists, leaveOut = [] }: AutosaveProps) {
  const [saved, setSaved] = useState<Saved>('kept');
  const [version, setVersion] = useState(first);
  const place = useRef<HTMLInputElement>(null);
  const current = useRef(first);
  const saves = useRef<Promise<void>>(Promise.resolve());
  const manners = useRef({ url, lists, leaveOut });
  useEffect(() => {
    const form = place.current?.form;
    if (!form) return undefined;
    let timer: ReturnType<typeof setTimeout> | undefined;
    let isOpen = false;
    const save = async () => {
      if (!isOpen) return;
      isOpen = false;
      const answer = await put(manners.current.url, current.current, bodyOf(form, manners.current));
      if (typeof answer === 'string') {
        isOpen = answer === 'waiting';
        setSaved(answer);
        return;
      }
      current.current = answer;
      setVersion(answer);
      setSaved('kept');
    };
    const queue = () => {
      saves.current = saves.current.then(save);
    };
    const change = () => {
      isOpen = true;
      setSaved('keeping');
      clearTimeout(timer);
      timer = setTimeout(queue, 500);
    };
    form.addEventListener('input', change);
    window.addEventListener('pagehide', queue);
    window.addEventListener('online', queue);
    return () => {
      clearTimeout(timer);
      form.removeEventListener('input', change);
      window.removeEventListener('pagehide', queue);
      window.removeEventListener('online', queue);
    };
  }, []);
  return (
    <>
      <input ref={place} type="hidden" name="version" value={version} readOnly />
      <p className="note" aria-live="polite">
        {WORDS[saved]}
      </p>
    </>
  );
}

function bodyOf(
  form: HTMLFormElement,
  { lists, leaveOut = [] }: { lists: readonly string[]; leaveOut?: readonly string[] },
): string {
  const data = new FormData(form);
  const out = new Set(['version', 'requestKey', 'orderId', ...leaveOut]);
  const names = [...new Set(data.keys())].filter((name) => !out.has(name) && !name.startsWith('$'));
  const one = Object.fromEntries(names.map((name) => [name, data.get(name)]));
  return JSON.stringify({ ...one, ...Object.fromEntries(lists.map((name) => [name, data.getAll(name)])) });
}

/** Answers the new version, or why it was not kept. Survives leaving the page. */
async function put(
  url: string,
  version: number,
  body: string,
): Promise<number | Exclude<Saved, 'kept' | 'keeping'>> {
  try {
    const response = await fetch(url, {
      method: 'PUT',
      headers: { 'content-type': 'application/json', 'if-match': `"${version}"` },
      body,
      keepalive: true,
    });
    if (response.status === 412) return 'stale';
    if (response.status === 422) return 'refused';
    if (!response.ok) return 'waiting';
    return ((await response.json()) as { version: number }).version;
  } catch {
    return 'waiting';
  }
}
