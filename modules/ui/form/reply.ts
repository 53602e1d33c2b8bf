/** What a submit comes back with. Only "ok" lets the form go; every other answer keeps what was typed. */
export type Reply<T> =
  | { status: "ok"; value: T }
  | { status: "refused"; code: string; message: string; field?: string; data?: Record<string, string | number | boolean | null> }
  | { status: "invalid"; fields: { path: string; message: string }[] }
  | { status: "conflict"; message: string }
  | { status: "signed-out" }
  | { status: "error"; reference: string };
