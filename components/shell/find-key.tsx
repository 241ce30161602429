'use client';

import { useEffect } from 'react';

/** The slash key goes to the find box from anywhere, unless somebody is typing. */
export function FindKey({ boxId }: { boxId: string }) {
  useEffect(() => {
    const press = (key: KeyboardEvent) => {
      const at = key.target instanceof HTMLElement ? key.target : null;
      const isTyping = at !== null && (at.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(at.tagName));
      if (key.key !== '/' || isTyping || key.ctrlKey || key.metaKey || key.altKey) return;
      key.preventDefault();
      document.getElementById(boxId)?.focus();
    };
    document.addEventListener('keydown', press);
    return () => document.removeEventListener('keydown', press);
  }, [boxId]);
  return null;
}
