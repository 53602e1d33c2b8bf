import { TRY_AGAIN } from "@/modules/kernel/away";

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

/**
 * Whether an answer settles the request, so that the next press is a new intent. Until then (signed out, our fault, the
 * shop's data away) the shop may or may not have done it, and a repeat must carry the same request id.
 */
export const settles = (reply: Reply<unknown>): boolean =>
  reply.status !== "signed-out" && reply.status !== "error" && !(reply.status === "refused" && reply.code === TRY_AGAIN);
