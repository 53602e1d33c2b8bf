import "server-only";
import { awayOf } from "@/db/outage";
import { AWAY_WORDS, RETRY_AFTER_S, TRY_AGAIN } from "@/modules/kernel/away";
import { NotFound } from "./context";
import { logFault } from "./fault";

/** An answer that is not yes, as an RFC 9457 document. */
export const problem = (status: number, title: string, more: object = {}, headers: HeadersInit = {}): Response =>
  Response.json({ type: "about:blank", title, status, ...more }, { status, headers: { "content-type": "application/problem+json", "cache-control": "no-store", ...headers } });

/** What an error that reached the edge means to the caller. A fault is logged here, under the reference that is told. */
function meaningOf(where: string, error: unknown): { status: 404 | 503; title: string } | { status: 500; reference: string } {
  if (error instanceof NotFound) return { status: 404, title: "Not found." };
  const away = awayOf(error);
  const reference = logFault(where, error);
  return away ? { status: 503, title: AWAY_WORDS[away] } : { status: 500, reference };
}

const later = { "retry-after": String(RETRY_AFTER_S) };

/** The last answer of a route that speaks JSON: 404, 503 with Retry-After, or 500 with a reference. `words` are said with a 500. */
export function problemOf(where: string, error: unknown, words = "Something broke on our side."): Response {
  const it = meaningOf(where, error);
  switch (it.status) {
    case 404: return problem(404, it.title);
    case 503: return problem(503, it.title, { code: TRY_AGAIN }, later);
    case 500: return problem(500, words, { reference: it.reference });
  }
}

/** The same for a route that answers a file or a paper, in plain words. */
export function plainProblemOf(where: string, error: unknown, words: string): Response {
  const it = meaningOf(where, error);
  const answer = (text: string, headers: HeadersInit = {}) =>
    new Response(text, { status: it.status, headers: { "content-type": "text/plain; charset=utf-8", "cache-control": "no-store", ...headers } });
  switch (it.status) {
    case 404: return answer(it.title);
    case 503: return answer("The shop's data cannot be reached just now. Try again.", later);
    case 500: return answer(`${words} Reference ${it.reference}.`);
  }
}
