import { setTimeout as sleep } from "node:timers/promises";
import { json, type Answer, type Call } from "../shared/http";

/**
 * What goes wrong with the next calls of the API:
 * 500, 429 and 503: refused before anything happened; `hang`: no answer for a minute; `reset`: the connection breaks
 * before anything happened; `lost`: it happens, but the answer is lost; `truncate`: half an answer.
 */
export type ApiFault = 500 | 503 | 429 | "hang" | "reset" | "lost" | "truncate";
export const API_FAULTS: readonly ApiFault[] = [500, 503, 429, "hang", "reset", "lost", "truncate"];

export class ApiFaults {
  private fault: ApiFault | null = null;
  private left = 0;

  set(fault: ApiFault | null, times: number): void {
    this.fault = fault;
    this.left = fault === null ? 0 : times;
  }

  get pending(): { fail: ApiFault | null; times: number } {
    return { fail: this.left > 0 ? this.fault : null, times: this.left };
  }

  /** Answer a call, or spoil it. */
  async around(call: Call, answer: () => Answer): Promise<Answer | null> {
    if (this.left <= 0 || this.fault === null) return answer();
    this.left -= 1;
    const { fault } = this;
    if (fault === "reset" || fault === "lost") {
      if (fault === "lost") answer();
      call.request.socket.destroy();
      return null;
    }
    if (fault === "hang") {
      await sleep(60_000, undefined, { ref: false });
      return answer();
    }
    if (fault === "truncate") {
      const whole = answer();
      const body = Buffer.from(whole.body ?? "");
      return { ...whole, body: body.subarray(0, Math.floor(body.length / 2)) };
    }
    const type = fault === 429 ? "rate_limit_error" : "api_error";
    return json({ error: { type, message: "A fault set on purpose." } }, fault);
  }
}
