import { TRY_AGAIN } from "@/modules/kernel/away";
import { settles, type Reply } from "./reply";

/** What stands above the form when it was not saved. Field errors are not here: they stand under their fields. */
export type Trouble =
  | { kind: "no-link" }
  | { kind: "signed-out" }
  | { kind: "refused"; message: string; code: string; data: Record<string, string | number | boolean | null> }
  | { kind: "away"; message: string }
  | { kind: "conflict"; message: string }
  | { kind: "error"; reference: string };

export interface FieldError {
  path: string;
  message: string;
}

export interface Reading {
  trouble: Trouble | null;
  fields: FieldError[];
  /** The request never got an answer that settles it: a repeat must carry the same request id. */
  keepId: boolean;
}

/** Sorts an unsuccessful reply into what goes above the form and what goes under fields. */
export function readReply(reply: Exclude<Reply<unknown>, { status: "ok" }>): Reading {
  const keepId = !settles(reply);
  switch (reply.status) {
    case "refused":
      if (reply.field !== undefined) {
        return { trouble: null, fields: [{ path: reply.field, message: reply.message }], keepId };
      }
      if (reply.code === TRY_AGAIN) return { trouble: { kind: "away", message: reply.message }, fields: [], keepId };
      return { trouble: { kind: "refused", message: reply.message, code: reply.code, data: reply.data ?? {} }, fields: [], keepId };
    case "invalid":
      return { trouble: null, fields: reply.fields, keepId };
    case "conflict":
      return { trouble: { kind: "conflict", message: reply.message }, fields: [], keepId };
    case "signed-out":
      return { trouble: { kind: "signed-out" }, fields: [], keepId };
    case "error":
      return { trouble: { kind: "error", reference: reply.reference }, fields: [], keepId };
  }
}

/** No answer at all: lost link, server away, or an answer that took too long. */
export const noLink: Reading = { trouble: { kind: "no-link" }, fields: [], keepId: true };
