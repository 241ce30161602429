'use client';

import { Scroll } from '@/components/ui/scroll';
import type { ReactNode } from 'react';
import type { Made } from '@/lib/domain/builds/made';
import { type Filled, pathsOf, type Raw, rowsOf } from '@/lib/domain/operations/fill';
import type { Field, Operation } from '@/lib/domain/operations/operation';

interface SheetFieldsProps {
  operation: Operation;
  made: Made;
  raw: Raw;
  filled: Filled;
  set: (path: string, text: string) => void;
}

/** Everything the sheet asks: boxes, columns, grids and choices, in its own order. */
export function SheetFields(props: SheetFieldsProps) {
  return (
    <>
      {props.operation.sheet.map(({ title, show }) => (
        <section key={title} className="sheet px-5 py-4">
          <h2 className="mb-3 text-[17px]">{title}</h2>
          <div className="grid gap-4 sm:grid-cols-2">
            {show.map((name) => {
              const field = props.operation.fields[name];
              return field && <SheetField key={name} name={name} field={field} {...props} />;
            })}
          </div>
          {show
            .flatMap((name) => pathsOf(props.operation, name, props.made))
            .map((path) => (
              <Question key={path} path={path} {...props} />
            ))}
        </section>
      ))}
    </>
  );
}

type OneProps = SheetFieldsProps & { name: string; field: Field };

function SheetField(props: OneProps) {
  const { name, field } = props;
  if (field.per === 'position') return <Grid {...props} />;
  if (field.per === 'feature') return <Column {...props} />;
  if (field.quantity === 'choice') return <Choice {...props} />;
  return (
    <div>
      <label htmlFor={name} className="mb-1 block text-[15px] font-semibold">
        {field.label}
      </label>
      <Box {...props} path={name} label={field.label} />
      <Beside {...props} path={name} />
    </div>
  );
}

function Box({ path, label, field, raw, filled, set }: OneProps & { path: string; label: string }) {
  const questioned = filled.questions.some((question) => question.path === path);
  const problem = filled.problems[path] !== undefined;
  return (
    <input
      id={path}
      type="text"
      inputMode={field.quantity === 'length' ? 'decimal' : 'text'}
      autoComplete="off"
      aria-label={label}
      aria-invalid={problem || questioned || undefined}
      aria-describedby={problem || questioned ? `${path}-said` : undefined}
      value={raw[path] ?? ''}
      placeholder={field.fallback && field.quantity === 'length' ? field.fallback.value : undefined}
      onChange={(typed) => set(path, typed.target.value)}
      className={`box min-w-20 ${field.quantity === 'length' ? 'box-size' : ''} ${questioned ? 'border-2 border-tocut bg-tocut-wash' : ''}`}
    />
  );
}

function Beside({ path, field, raw, filled }: OneProps & { path: string }) {
  const problem = filled.problems[path];
  if (problem !== undefined) {
    return (
      <p id={`${path}-said`} className="mt-1 text-sm font-semibold text-past">
        {problem}
      </p>
    );
  }
  const speaks = field.fallback && (raw[path] ?? '') === '' && field.quantity === 'length';
  return speaks ? <p className="note mt-0.5">{field.fallback.source}</p> : null;
}

function Choice({ name, field, raw, set }: OneProps) {
  return (
    <div>
      <label htmlFor={name} className="mb-1 block text-[15px] font-semibold">
        {field.label}
      </label>
      <select
        id={name}
        className="box"
        value={raw[name] ?? field.fallback?.value ?? ''}
        onChange={(chosen) => set(name, chosen.target.value)}
      >
        {(field.choices ?? []).map(({ value, label }) => (
          <option key={value} value={value}>
            {label}
          </option>
        ))}
      </select>
    </div>
  );
}

function Around({ field, children }: { field: Field; children: ReactNode }) {
  return (
    <fieldset className="sm:col-span-2">
      <legend className="text-[15px] font-semibold">{field.label}</legend>
      {field.condition !== undefined && <p className="note mb-2">{field.condition}</p>}
      {children}
    </fieldset>
  );
}

function Column(props: OneProps) {
  const { operation, field, made, name } = props;
  const noun = field.rows === 'rods' ? 'Rod' : field.rows === 'cylinders' ? 'Cylinder' : 'Journal';
  return (
    <Around field={field}>
      <div className="grid grid-cols-2 gap-3 sm:grid-cols-4">
        {rowsOf(operation, field, made).map((row) => {
          const path = `${name}.${row}`;
          return (
            <div key={row}>
              <span aria-hidden className="note num">
                {row}
              </span>
              <Box {...props} path={path} label={`${field.label}, ${noun} ${row}`} />
              <Beside {...props} path={path} />
            </div>
          );
        })}
      </div>
    </Around>
  );
}

function Grid(props: OneProps) {
  const { operation, field, made, name } = props;
  return (
    <Around field={field}>
      <Scroll label={field.label}>
        <table className="w-full text-[15px]">
          <thead>
            <tr className="border-b border-rule text-left text-[13px] text-ink-3">
              <th className="py-1 font-medium">Cyl</th>
              {operation.positions.map((position) => (
                <th key={position} className="px-1 py-1 font-medium">
                  {position}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rowsOf(operation, field, made).map((row) => (
              <tr key={row} className="border-b border-rule-2">
                <th scope="row" className="num pr-2 text-left font-normal">
                  {row}
                </th>
                {operation.positions.map((position) => (
                  <td key={position} className="p-1">
                    <Box
                      {...props}
                      path={`${name}.${row}.${position}`}
                      label={`Cylinder ${row}, ${position.toLowerCase()}`}
                    />
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </Scroll>
    </Around>
  );
}

/** A value that is probably not what was measured: taken only when somebody says which it is. */
function Question({ path, filled, set }: SheetFieldsProps & { path: string }) {
  const question = filled.questions.find((one) => one.path === path);
  if (!question) return null;
  const { meant } = question;
  const [, row = '', position = ''] = path.split('.');
  return (
    <div
      id={`${path}-said`}
      role="status"
      className="mt-3 border-l-4 border-tocut bg-tocut-wash px-3.5 py-2.5 text-[15px]"
    >
      <p>
        ▲ {[row, position].filter(Boolean).join(', ')}
        {row === '' ? '' : ': '}
        {question.words} It counts as missing until you say which it is.
      </p>
      <p className="mt-2 flex flex-wrap gap-2">
        {meant !== undefined && (
          <button type="button" className="btn btn-ghost" onClick={() => set(path, meant)}>
            It is <span className="num">{meant}</span>
          </button>
        )}
        <button type="button" className="btn btn-ghost" onClick={() => set(`keep:${path}`, question.text)}>
          <span className="num">{question.text}</span> is what I measured
        </button>
      </p>
    </div>
  );
}
