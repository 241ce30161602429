'use client';

import { useRef, useState } from 'react';

interface PhotoPickerProps {
  orderId: string;
  label?: string;
}

interface Kept {
  readonly id: string;
  readonly name: string;
}

/** Photos and PDFs to go with what is being written; each is sent at once and hangs on it when it is. */
export function PhotoPicker({ orderId, label = 'Add photo' }: PhotoPickerProps) {
  const [kept, setKept] = useState<readonly Kept[]>([]);
  const [said, setSaid] = useState('');
  const picker = useRef<HTMLInputElement>(null);
  const send = async (files: FileList) => {
    for (const file of files) {
      setSaid(`Sending ${file.name} …`);
      const form = new FormData();
      form.append('orderId', orderId);
      form.append('file', file);
      try {
        const response = await fetch('/api/v1/files', { method: 'POST', body: form });
        const answer = (await response.json()) as { id?: string; title?: string };
        const { id } = answer;
        if (id === undefined) {
          setSaid(`${file.name}: ${answer.title ?? 'not kept'}`);
          return;
        }
        setKept((before) => [...before, { id, name: file.name }]);
        setSaid('');
      } catch {
        setSaid(`${file.name} was not sent: no connection. Choose it again.`);
        return;
      }
    }
    if (picker.current) picker.current.value = '';
  };
  return (
    <div>
      {kept.map(({ id, name }) => (
        <p key={id} className="note flex items-center gap-2">
          <input type="hidden" name="files" value={id} />
          <span className="truncate">{name}</span>
          <button
            type="button"
            className="min-h-11 px-2 text-past underline"
            onClick={() => setKept((before) => before.filter((one) => one.id !== id))}
          >
            Take away
          </button>
        </p>
      ))}
      <label className="btn btn-ghost">
        {label}
        <input
          ref={picker}
          type="file"
          className="sr-only"
          multiple
          accept="image/jpeg,image/png,image/webp,application/pdf"
          onChange={(chosen) => {
            if (chosen.target.files) void send(chosen.target.files);
          }}
        />
      </label>
      <p role="status" className="note">
        {said}
      </p>
    </div>
  );
}
