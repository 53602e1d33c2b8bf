/** A refusal the person can act on. `message` says what is wrong and what would be accepted. */
export interface Refusal {
  readonly code: string;
  readonly message: string;
  /** Path of the input the refusal belongs to, in dotted form (`lines.2.qty`). Absent = whole form. */
  readonly field?: string;
  /** Several fields at once, from the input schema. */
  readonly fields?: readonly { readonly path: string; readonly message: string }[];
  readonly data?: Readonly<Record<string, string | number | boolean | null>>;
}

export type Ok<T> = { readonly ok: true; readonly value: T };
export type Refused = { readonly ok: false; readonly refusal: Refusal };
export type Result<T> = Ok<T> | Refused;

export const ok = <T>(value: T): Ok<T> => ({ ok: true, value });

export const refuse = (
  code: string,
  message: string,
  more: { field?: string; data?: Refusal["data"] } = {},
): Refused => ({ ok: false, refusal: { code, message, ...more } });
