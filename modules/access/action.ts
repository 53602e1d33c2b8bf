import "server-only";
import { awayOf } from "@/db/outage";
import { AWAY_WORDS, TRY_AGAIN } from "@/modules/kernel/away";
import type { Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import type { Reply } from "@/modules/ui/form/reply";
import type { Command } from "./command";
import { NotFound, type ShopContext } from "./context";
import { logFault } from "./fault";
import { sameOrigin } from "./origin";
import { shopContextOrNull } from "./session";

export const ACTION_MARK = Symbol.for("valvekeeper.action");
export interface Sent { requestId: string; input: unknown }

/** A result as the browser gets it. */
function replyOf<T>(result: Result<T>): Reply<T> {
  if (result.ok) return { status: "ok", value: result.value };
  const { code, message, field, fields, data } = result.refusal;
  if (fields) return { status: "invalid", fields: [...fields] };
  if (code === "CHANGED_MEANWHILE") return { status: "conflict", message };
  return { status: "refused", code, message, ...(field ? { field } : {}), ...(data ? { data: { ...data } } : {}) };
}

/**
 * A server action from a command. Every exported action is made here: origin, sign-in, membership, then the command,
 * which asks for the role itself. Refusals and faults become a reply; typed text is never the price of an error.
 */
export function shopAction<S extends z.ZodType, T>(command: Command<S, T>) {
  const action = async (shop: string, sent: Sent): Promise<Reply<T>> =>
    guarded(command.spec.name, async () => {
      const ctx = await shopContextOrNull(String(shop));
      if (!ctx) return { status: "signed-out" };
      return replyOf(await command(ctx, sent.input as z.input<S>, { requestId: requestIdOf(sent) }));
    });
  return Object.assign(action, { [ACTION_MARK]: command.spec.name });
}

/** The same for acts of a customer or a tablet, whose context comes from the secret they hold. */
export function secretAction<S extends z.ZodType, T>(command: Command<S, T>, contextOf: (secret: string) => Promise<ShopContext | null>) {
  const action = async (secret: string, sent: Sent): Promise<Reply<T>> =>
    guarded(command.spec.name, async () => {
      const ctx = await contextOf(String(secret));
      if (!ctx) throw new NotFound();
      return replyOf(await command(ctx, sent.input as z.input<S>, { requestId: requestIdOf(sent) }));
    });
  return Object.assign(action, { [ACTION_MARK]: command.spec.name });
}

function requestIdOf(sent: Sent): string {
  if (!/^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/.test(sent?.requestId)) throw new NotFound("request id");
  return sent.requestId;
}

async function guarded<T>(where: string, work: () => Promise<Reply<T>>): Promise<Reply<T>> {
  try {
    if (!(await sameOrigin())) return { status: "refused", code: "FOREIGN_ORIGIN", message: "This came from another site. Open the page again and try once more." };
    return await work();
  } catch (error) {
    if (error instanceof NotFound) return { status: "refused", code: "NOT_FOUND", message: "Not found. It may be gone, or your role does not reach it." };
    const reference = logFault(where, error);
    const away = awayOf(error);
    return away ? { status: "refused", code: TRY_AGAIN, message: AWAY_WORDS[away] } : { status: "error", reference };
  }
}
