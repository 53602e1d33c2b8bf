/**
 * What a command sent from a form answers. `refused` is a rule of the shop speaking, `invalid` the input's own shape,
 * `conflict` someone else saved first, `error` our fault with a reference to quote.
 */
export type Reply<T> =
  | { status: "ok"; value: T }
  | { status: "refused"; code: string; message: string; field?: string; data?: Record<string, string | number | boolean | null> }
  | { status: "invalid"; fields: { path: string; message: string }[] }
  | { status: "conflict"; message: string }
  | { status: "signed-out" }
  | { status: "error"; reference: string };
