import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { commandLog } from "@/db/schema";
import { withShop } from "@/db/scope";
import { isRetryable, ruleOf } from "@/db/errors";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { canonical, sha256, writeAudit } from "./audit";
import { NotFound, type ShopContext, type TxContext } from "./context";
import { env } from "./env";
import { can, type Act } from "./roles";

export interface CommandSpec<S extends z.ZodType, T> {
  /** Verb of the shop, as in the audit trail: `workOrders.open`. */
  readonly name: string;
  readonly act: Act;
  readonly input: S;
  /** One transaction: read, decide by pure functions, write. Returns plain JSON values. Nothing outside is called here. */
  run(ctx: TxContext, input: z.output<S>): Promise<Result<T>>;
  /** What the audit row is about. */
  subject?(input: z.output<S>, value: T): { kind: string; id: string };
  /** Keys never written to the audit trail (PIN, password). */
  readonly secret?: readonly string[];
}

export interface Command<S extends z.ZodType, T> {
  (ctx: ShopContext, raw: z.input<S>, options?: { requestId?: string }): Promise<Result<T>>;
  readonly spec: CommandSpec<S, T>;
}
export const COMMAND_MARK = Symbol.for("valvekeeper.command");

class Rollback extends Error {
  constructor(readonly result: Result<never>) { super("rolled back"); }
}

const fieldsOf = (error: z.ZodError) => error.issues.map((i) => ({ path: i.path.join("."), message: i.message }));

/**
 * The only way to change anything: actor, strict schema, idempotency key, one transaction, audit row.
 * A request id that was answered before gets that answer again; with other input it is refused.
 */
export function defineCommand<S extends z.ZodType, T>(spec: CommandSpec<S, T>): Command<S, T> {
  const command = async (ctx: ShopContext, raw: z.input<S>, options: { requestId?: string } = {}): Promise<Result<T>> => {
    if (!can(ctx.actor, spec.act)) throw new NotFound();
    const parsed = spec.input.safeParse(raw);
    if (!parsed.success) {
      return { ok: false, refusal: { code: "INVALID_INPUT", message: "Some fields need another look.", fields: fieldsOf(parsed.error) } };
    }
    if (ctx.tx) return execute(ctx as TxContext, parsed.data, null);

    const requestId = options.requestId ?? null;
    // A short secret could be guessed from a plain hash of the input, so the server's own secret goes in with it.
    const inputHash = sha256(`${spec.secret?.length ? env().VK_PIN_PEPPER : ""}${canonical(raw)}`);
    for (let attempt = 1; ; attempt++) {
      try {
        return await withShop(ctx.shop.id, async (tx) => {
          const inner: TxContext = { ...ctx, tx };
          if (requestId) {
            await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`${ctx.shop.id}:${requestId}`}, 1))`);
            const [before] = await tx.select().from(commandLog).where(and(eq(commandLog.shopId, ctx.shop.id), eq(commandLog.requestId, requestId)));
            if (before) {
              if (before.command !== spec.name || before.inputHash !== inputHash || before.actor !== `${ctx.actor.kind}:${ctx.actor.id}`) {
                return refuse("REQUEST_ID_REUSED", "This request was sent before with other content. Reload the page and try again.");
              }
              return ok(before.reply as T);
            }
          }
          const result = await execute(inner, parsed.data, requestId);
          if (!result.ok) throw new Rollback(result);
          if (requestId) {
            await tx.insert(commandLog).values({ shopId: ctx.shop.id, requestId, command: spec.name, actor: `${ctx.actor.kind}:${ctx.actor.id}`, inputHash, reply: result.value ?? null });
          }
          return result;
        });
      } catch (error) {
        if (error instanceof Rollback) return error.result;
        if (isRetryable(error) && attempt < 4) continue;
        const rule = ruleOf(error);
        if (rule) return refuse(rule.code, rule.message, rule.field ? { field: rule.field } : {});
        throw error;
      }
    }
  };

  async function execute(ctx: TxContext, input: z.output<S>, requestId: string | null): Promise<Result<T>> {
    const result = await spec.run(ctx, input);
    if (!result.ok) return result;
    // A first answer and its repeat must read alike, so both go through JSON.
    const value = JSON.parse(JSON.stringify(result.value ?? null)) as T;
    const subject = spec.subject?.(input, value);
    await writeAudit(ctx, { command: spec.name, requestId, subjectKind: subject?.kind, subjectId: subject?.id, detail: { input: without(input, spec.secret), value } });
    return ok(value);
  }

  return Object.assign(command, { spec, [COMMAND_MARK]: true });
}

function without(input: unknown, secret: readonly string[] = []): unknown {
  if (!secret.length || typeof input !== "object" || input === null) return input;
  return Object.fromEntries(Object.entries(input).filter(([k]) => !secret.includes(k)));
}

/** For the edit forms: the record changed since it was opened. */
export const changedMeanwhile = (what = "This record") =>
  refuse("CHANGED_MEANWHILE", `${what} was changed by somebody else since you opened it. Reload to see it; what you typed is still here.`);
