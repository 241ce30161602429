'use client';

import { type ReactNode, useId } from 'react';
import { useFormContext } from '@/components/forms/form';

interface FieldProps {
  name: string;
  label: string;
  hint?: ReactNode;
  defaultValue?: string;
  required?: boolean;
  className?: string;
}

interface Shell {
  id: string;
  value: string;
  describedBy: string | undefined;
  invalid: boolean;
}

function useField({ name, defaultValue = '', hint }: FieldProps): Shell & { errors: readonly string[] } {
  const id = useId();
  const { state } = useFormContext();
  const errors = state.fields?.[name] ?? [];
  const described = [hint === undefined ? '' : `${id}-hint`, errors.length > 0 ? `${id}-error` : ''].filter(
    (one) => one !== '',
  );
  return {
    id,
    errors,
    value: state.values?.[name] ?? defaultValue,
    invalid: errors.length > 0,
    describedBy: described.length > 0 ? described.join(' ') : undefined,
  };
}

function Around({
  field,
  props,
  children,
}: {
  field: Shell & { errors: readonly string[] };
  props: FieldProps;
  children: ReactNode;
}) {
  return (
    <div className={props.className}>
      <label htmlFor={field.id} className="mb-1 block text-[15px] font-semibold">
        {props.label}
      </label>
      {props.hint !== undefined && (
        <p id={`${field.id}-hint`} className="note mb-1">
          {props.hint}
        </p>
      )}
      {children}
      {field.errors.length > 0 && (
        <p id={`${field.id}-error`} className="mt-1 text-sm font-semibold text-past">
          {field.errors.join(' ')}
        </p>
      )}
    </div>
  );
}

type TextFieldProps = FieldProps & {
  type?: 'text' | 'email' | 'password' | 'date';
  autoComplete?: string;
  mono?: boolean;
};

/** A line of text. */
export function TextField(props: TextFieldProps) {
  const { name, type = 'text', autoComplete, required, mono } = props;
  const field = useField(props);
  return (
    <Around field={field} props={props}>
      <input
        id={field.id}
        name={name}
        type={type}
        autoComplete={autoComplete}
        required={required}
        defaultValue={type === 'password' ? '' : field.value}
        aria-invalid={field.invalid || undefined}
        aria-describedby={field.describedBy}
        className={`box ${mono ? 'box-size' : ''}`}
      />
    </Around>
  );
}

/** A size or an amount: never a number field, which changes under a wheel and drops what it does not like. */
export function SizeField(props: FieldProps) {
  const field = useField(props);
  return (
    <Around field={field} props={props}>
      <input
        id={field.id}
        name={props.name}
        type="text"
        inputMode="decimal"
        autoComplete="off"
        defaultValue={field.value}
        aria-invalid={field.invalid || undefined}
        aria-describedby={field.describedBy}
        className="box box-size"
      />
    </Around>
  );
}

/** Several lines of text. */
export function TextArea(props: FieldProps) {
  const field = useField(props);
  return (
    <Around field={field} props={props}>
      <textarea
        id={field.id}
        name={props.name}
        defaultValue={field.value}
        aria-invalid={field.invalid || undefined}
        aria-describedby={field.describedBy}
        className="box"
      />
    </Around>
  );
}

type SelectFieldProps = FieldProps & { options: readonly { value: string; label: string }[] };

/** One of a list. */
export function SelectField(props: SelectFieldProps) {
  const field = useField(props);
  return (
    <Around field={field} props={props}>
      <select
        id={field.id}
        name={props.name}
        defaultValue={field.value}
        aria-invalid={field.invalid || undefined}
        aria-describedby={field.describedBy}
        className="box"
      >
        {props.options.map(({ value, label }) => (
          <option key={value} value={value}>
            {label}
          </option>
        ))}
      </select>
    </Around>
  );
}

type ChoiceFieldProps = FieldProps & {
  kind: 'radio' | 'checkbox';
  options: readonly { value: string; label: string; note?: string }[];
};

const LONG = 14;

/** Choices that all stand in view: one of them, or several. */
export function ChoiceField(props: ChoiceFieldProps) {
  const field = useField(props);
  const chosen = new Set(field.value.split('\n'));
  return (
    <fieldset className={props.className} aria-describedby={field.describedBy}>
      <legend className="mb-1 text-[15px] font-semibold">{props.label}</legend>
      {props.hint !== undefined && (
        <p id={`${field.id}-hint`} className="note mb-1">
          {props.hint}
        </p>
      )}
      {/* A long list scrolls in its own box, so that what follows it stays in reach. */}
      <div
        className={`grid gap-2 sm:grid-cols-2 ${props.options.length > LONG ? 'max-h-96 overflow-y-auto border border-rule-2 p-2' : ''}`}
      >
        {props.options.map(({ value, label, note }) => (
          <label
            key={value}
            className="flex min-h-12 cursor-pointer items-center gap-3 rounded border border-rule px-3 py-2 has-checked:border-blue has-checked:bg-blue-wash"
          >
            <input
              type={props.kind}
              name={props.name}
              value={value}
              defaultChecked={chosen.has(value)}
              className="size-5 shrink-0 accent-[var(--blue)]"
            />
            <span>
              {label}
              {note !== undefined && <span className="note block">{note}</span>}
            </span>
          </label>
        ))}
      </div>
      {field.errors.length > 0 && (
        <p id={`${field.id}-error`} className="mt-1 text-sm font-semibold text-past">
          {field.errors.join(' ')}
        </p>
      )}
    </fieldset>
  );
}
