'use client';

import { useEffect, useRef, useState } from 'react';
import { useFormContext } from '@/components/forms/form';
import { keepVersion } from '@/components/forms/keep-version';

interface AutosaveProps {
  /** Where the form is kept, by PUT. */
  url: string;
  /** The version seen; 0 for something that is made by the first save. */
  version: number;
  /** Fields of which there may be several. */
  lists: readonly string[];
}

type Saved = 'kept' | 'keeping' | 'stale' | 'waiting' | 'refused';

const WORDS: Readonly<Record<Saved, string>> = {
  kept: 'Kept as you type.',
  keeping: 'Keeping …',
  waiting: 'Not kept yet: no connection. What you typed is still here.',
  refused: 'Not kept: something here cannot be read. Press the button to see what.',
  stale: 'This was changed on another screen in the meantime. Load the page again to see it.',
};

/**
 * Keeps the form around it while one types, half a second after the last change and when the page is left. The
 * version stands in a hidden box, so that the form's own press carries the one that the last save made; a press waits
 * for a save that is on its way.
 */
export function Autosave({ url, version, lists }: AutosaveProps) {
  const { state } = useFormContext();
  const [saved, setSaved] = useState<Saved>('kept');
  // After a refusal the fields are made anew: the version goes on from the one that was pressed.
  const [current, setCurrent] = useState(state.values?.['version'] ?? String(version));
  const box = useRef<HTMLInputElement>(null);
  const manners = useRef({ url, lists });
  useEffect(() => {
    const versionBox = box.current;
    const form = versionBox?.form;
    if (!versionBox || !form) return undefined;
    let timer: ReturnType<typeof setTimeout> | undefined;
    let saving: Promise<void> | undefined;
    let isOpen = false;
    const save = async () => {
      isOpen = false;
      const { url: to, lists: many } = manners.current;
      const answer = await keepVersion(to, Number(versionBox.value), bodyOf(form, many));
      if (answer.is === 'kept') {
        // At once, not with the next drawing: a press or a save may be waiting for it.
        versionBox.value = String(answer.version);
        setCurrent(versionBox.value);
      }
      if (answer.is === 'waiting') isOpen = true;
      setSaved(answer.is);
    };
    // One save after the other: each carries the version that the one before it made.
    const queue = () => {
      if (!isOpen) return;
      const mine = (saving ?? Promise.resolve()).then(save).finally(() => {
        if (saving === mine) saving = undefined;
      });
      saving = mine;
    };
    const change = () => {
      isOpen = true;
      setSaved('keeping');
      clearTimeout(timer);
      timer = setTimeout(queue, 500);
    };
    const press = (submit: SubmitEvent) => {
      // What is typed goes with the press itself.
      clearTimeout(timer);
      isOpen = false;
      if (!saving) return;
      submit.preventDefault();
      submit.stopPropagation();
      void saving.then(() => form.requestSubmit(submit.submitter));
    };
    form.addEventListener('input', change);
    form.addEventListener('submit', press);
    window.addEventListener('pagehide', queue);
    window.addEventListener('online', queue);
    return () => {
      clearTimeout(timer);
      form.removeEventListener('input', change);
      form.removeEventListener('submit', press);
      window.removeEventListener('pagehide', queue);
      window.removeEventListener('online', queue);
    };
  }, []);
  return (
    <>
      <input ref={box} type="hidden" name="version" value={current} readOnly />
      <p className="note" aria-live="polite">
        {WORDS[saved]}
      </p>
    </>
  );
}

/** What the form itself carries beside what is kept. */
const CARRIED = new Set(['version', 'requestKey', 'orderId']);

function bodyOf(form: HTMLFormElement, lists: readonly string[]): string {
  const data = new FormData(form);
  const names = [...new Set(data.keys())].filter((name) => !CARRIED.has(name) && !name.startsWith('$'));
  const one = Object.fromEntries(names.map((name) => [name, data.get(name)]));
  return JSON.stringify({ ...one, ...Object.fromEntries(lists.map((name) => [name, data.getAll(name)])) });
}
