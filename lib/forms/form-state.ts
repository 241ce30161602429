/** What a form knows after a press: refusals beside their fields, and everything that was typed. */
export interface FormState {
  /** One sentence for the whole form. */
  readonly message?: string;
  /** Sentences beside fields, by field name. */
  readonly fields?: Readonly<Record<string, readonly string[]>>;
  /** What was typed, so that a refusal loses nothing. */
  readonly values?: Readonly<Record<string, string>>;
  /** Set when somebody else changed the thing first: their values by field name, and the version they made. */
  readonly conflict?: { readonly version: number; readonly theirs: Readonly<Record<string, string>> };
  /** Said once when the deed is done. */
  readonly done?: string;
}

/** A server action as forms see it; pages pass it to client components as a prop. */
export type FormAction = (previous: FormState, form: FormData) => Promise<FormState>;
