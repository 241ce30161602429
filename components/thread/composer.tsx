'use client';

import { useState } from 'react';
import { Form, Submit } from '@/components/forms/form';
import { PhotoPicker } from '@/components/thread/photo-picker';
import { TextArea } from '@/components/forms/fields';
import type { FormAction } from '@/lib/forms/form-state';

interface ComposerProps {
  action: FormAction;
  orderId: string;
  to: string;
  firstKey: string;
}

/** Where one writes to the other shop. The key is the message's own id: sent twice, it stands once. */
export function Composer({ action, orderId, to, firstKey }: ComposerProps) {
  const [key, setKey] = useState(firstKey);
  const send: FormAction = async (previous, form) => {
    const answer = await action(previous, form);
    if (answer.message === undefined) setKey(crypto.randomUUID());
    return answer;
  };
  return (
    <Form action={send} requestKey={key} hidden={{ orderId }} label="Write a message">
      <TextArea name="body" label={`Write to ${to}`} />
      <div className="mt-2" key={key}>
        <PhotoPicker orderId={orderId} />
      </div>
      <div className="mt-2 flex items-center justify-between gap-2">
        <label className="note flex min-h-11 items-center gap-2">
          <input type="checkbox" name="weSpoke" value="yes" className="size-5" /> We spoke
        </label>
        <Submit>Send</Submit>
      </div>
    </Form>
  );
}
