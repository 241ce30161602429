'use client';

import { createContext, type ReactNode, use, useActionState, useEffect, useRef } from 'react';
import type { FormAction, FormState } from '@/lib/forms/form-state';

interface FormContextValue {
  readonly state: FormState;
  readonly isPending: boolean;
}

const FormContext = createContext<FormContextValue>({ state: {}, isPending: false });

/** What the form around a field knows. */
export function useFormContext(): FormContextValue {
  return use(FormContext);
}

export interface FormProps {
  action: FormAction;
  /** Made with the page: two presses of one form are one deed. */
  requestKey?: string;
  version?: number;
  hidden?: Readonly<Record<string, string>>;
  children: ReactNode;
  className?: string;
  label?: string;
}

/** A form of our own: refusals beside their fields, everything typed kept, focus moved to what is wrong. */
export function Form({ action, requestKey, version, hidden = {}, children, className, label }: FormProps) {
  const [state, send, isPending] = useActionState(action, {});
  const summary = useRef<HTMLParagraphElement>(null);
  useEffect(() => {
    if (state.message !== undefined) summary.current?.focus();
  }, [state]);
  return (
    <form action={send} className={className} aria-label={label} noValidate>
      {requestKey !== undefined && <input type="hidden" name="requestKey" value={requestKey} />}
      {version !== undefined && <input type="hidden" name="version" value={version} />}
      {Object.entries(hidden).map(([name, value]) => (
        <input key={name} type="hidden" name={name} value={value} />
      ))}
      {state.message !== undefined && (
        <p
          ref={summary}
          tabIndex={-1}
          role="alert"
          className="mb-3 border-l-4 border-past bg-past-wash px-3.5 py-2.5 text-[15px] font-semibold"
        >
          {state.message}
        </p>
      )}
      <output
        aria-live="polite"
        className={state.done === undefined ? 'sr-only' : 'mb-3 block font-semibold text-insize'}
      >
        {state.done}
      </output>
      {/* A new key gives every field what was typed as its first value again. */}
      <FormContext value={{ state, isPending }} key={JSON.stringify(state.values ?? {})}>
        {children}
      </FormContext>
    </form>
  );
}

/** The press itself; says that it is under way. */
export function Submit({
  children,
  kind = 'main',
  name,
  value,
}: {
  children: ReactNode;
  kind?: 'main' | 'ghost' | 'stop';
  name?: string;
  value?: string;
}) {
  const { isPending } = useFormContext();
  const look = { main: 'btn', ghost: 'btn btn-ghost', stop: 'btn btn-stop' }[kind];
  return (
    <button type="submit" className={look} disabled={isPending} name={name} value={value}>
      {children}
      {isPending && <span className="sr-only"> – under way</span>}
    </button>
  );
}
