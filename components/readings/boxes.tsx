'use client';

interface ChosenProps {
  label: string;
  value: string;
  set: (value: string) => void;
  options: readonly { value: string; label: string }[];
}

/** One of a list, in a form that lives in the browser. */
export function Chosen({ label, value, set, options }: ChosenProps) {
  return (
    <label className="block text-[15px] font-semibold">
      {label}
      <select className="box mt-1 font-normal" value={value} onChange={(chosen) => set(chosen.target.value)}>
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    </label>
  );
}

interface TypingProps {
  label: string;
  value: string;
  set: (value: string) => void;
  wrong: string;
  words?: true;
  hint?: string;
}

/** A size or a word as it is typed. */
export function Typing({ label, value, set, wrong, words, hint }: TypingProps) {
  return (
    <label className="block grow text-[15px] font-semibold">
      {label}
      {hint !== undefined && <span className="note block font-normal">{hint}</span>}
      <input
        type="text"
        inputMode={words ? 'text' : 'decimal'}
        autoComplete="off"
        className={`box mt-1 font-normal ${words ? '' : 'box-size'}`}
        value={value}
        aria-invalid={wrong !== '' || undefined}
        onChange={(typed) => set(typed.target.value)}
      />
      {wrong !== '' && <span className="mt-1 block text-sm text-past">{wrong}</span>}
    </label>
  );
}
