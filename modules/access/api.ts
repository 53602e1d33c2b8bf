import "server-only";
import type { Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import type { Command } from "./command";
import type { ShopContext } from "./context";
import { isOwnOrigin } from "./origin";
import { deviceContext, deviceCookie } from "./device";
import { problem, problemOf } from "./problem";
import { shopContextOrNull } from "./session";

/** One address of the HTTP API. The same schema checks it, types it and documents it. */
export interface Endpoint<S extends z.ZodType, T> {
  readonly method: "GET" | "POST";
  /** As in the document: `/api/v1/s/{shop}/parts`. */
  readonly path: string;
  readonly summary: string;
  readonly input: S;
  /** "person": a signed-in member. "device": an enrolled tablet or bench computer with its token. */
  readonly by: readonly ("person" | "device")[];
  /** A tablet put out of use may still call this, with the little it may still do. */
  readonly revokedToo?: boolean;
  /** Hands on what was sent, once the schema took it: a command reads typed text itself, and may not read it twice. */
  readonly asTyped?: boolean;
  run(ctx: ShopContext, input: z.output<S>, requestId: string | null): Promise<Result<T>>;
}

export const defineEndpoint = <S extends z.ZodType, T>(endpoint: Endpoint<S, T>): Endpoint<S, T> => endpoint;

/** An endpoint that runs a command with the command's own schema. */
export function commandEndpoint<S extends z.ZodType, T>(
  command: Command<S, T>, at: { path: string; summary: string; by?: Endpoint<S, T>["by"] },
): Endpoint<S, T> {
  return {
    method: "POST", path: at.path, summary: at.summary, input: command.spec.input, by: at.by ?? ["person"], asTyped: true,
    run: (ctx, input, requestId) => command(ctx, input as z.input<S>, requestId ? { requestId } : {}),
  };
}

const REQUEST_ID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;

/** The route handler of an endpoint: who, origin, schema, then the data layer; problems as RFC 9457 documents. */
export function handle<S extends z.ZodType, T>(endpoint: Endpoint<S, T>) {
  return async (request: Request, { params }: { params: Promise<Record<string, string> | undefined> }): Promise<Response> => {
    try {
      // An address without a variable part comes without params.
      const { shop = "", ...rest } = (await params) ?? {};
      const authorization = request.headers.get("authorization") ?? "";
      const isBearer = /^Bearer\b/i.test(authorization);
      const bearer = /^Bearer ([\w-]{20,200})$/i.exec(authorization)?.[1];
      let ctx: ShopContext | null = null;
      const revoked = endpoint.revokedToo ? { revokedToo: true } : {};
      if (isBearer) {
        // Sent by hand, never by a browser of itself, and no cookie is looked at beside it: no origin is asked.
        if (bearer && endpoint.by.includes("device")) ctx = await deviceContext(bearer, shop, revoked);
        if (!ctx) return problem(401, "This token opens nothing here: it is unknown, put out of use, or of another shop.", {}, { "www-authenticate": "Bearer" });
      } else {
        // Both secrets may come in cookies, which the browser sends by itself: so the origin is asked.
        if (endpoint.method !== "GET" && !isOwnOrigin(request.headers)) return problem(403, "This came from another site.");
        if (endpoint.by.includes("person")) ctx = await shopContextOrNull(shop);
        const held = ctx || !endpoint.by.includes("device") ? null : deviceCookie(request.headers.get("cookie"));
        if (held) ctx = await deviceContext(held, shop, revoked);
      }
      if (!ctx) return problem(401, "Sign in first.");

      let raw: unknown;
      let requestId: string | null = null;
      if (endpoint.method === "GET") raw = { ...Object.fromEntries(new URL(request.url).searchParams), ...rest };
      else {
        requestId = request.headers.get("idempotency-key");
        if (!requestId || !REQUEST_ID.test(requestId)) return problem(400, "Send an Idempotency-Key header: a UUID made once for this act.");
        // A line that breaks while the body is on its way leaves nobody to answer, and is no fault of ours.
        const text = await request.text().catch(() => null);
        if (text === null) return problem(400, "The body did not come whole.");
        if (text.length > 1_000_000) return problem(413, "The body is too long; at most 1 MB.");
        try { raw = { ...(JSON.parse(text) as object), ...rest }; } catch { return problem(400, "The body is not JSON."); }
      }
      const parsed = endpoint.input.safeParse(raw);
      if (!parsed.success) {
        return problem(422, "Some fields need another look.", { fields: parsed.error.issues.map((i) => ({ path: i.path.join("."), message: i.message })) });
      }
      const result = await endpoint.run(ctx, endpoint.asTyped ? (raw as z.output<S>) : parsed.data, requestId);
      if (result.ok) return Response.json(result.value ?? null, { headers: { "cache-control": "no-store" } });
      const { code, message, field, fields, data } = result.refusal;
      const status = code === "CHANGED_MEANWHILE" ? 409 : 422;
      return problem(status, message, { code, field, fields, data });
    } catch (error) {
      return problemOf(endpoint.path, error);
    }
  };
}
