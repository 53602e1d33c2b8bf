import { isHealthy } from "@/modules/access/health";
import { RETRY_AFTER_S } from "@/modules/kernel/away";

/** Says only whether the product can serve. */
export async function GET(): Promise<Response> {
  return (await isHealthy()) ? Response.json({ ok: true }) : Response.json({ ok: false }, { status: 503, headers: { "retry-after": String(RETRY_AFTER_S) } });
}
