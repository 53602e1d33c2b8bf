/** SQLSTATE of an error, found through the wrapping of driver and query builder; null when there is none. */
function stateOf(error: Error): string | null {
  const { code } = error as { code?: unknown };
  return typeof code === "string" && /^[0-9A-Z]{5}$/.test(code) ? code : null;
}

/** The error and what it was caused by, outermost first; also the tries of an address that has several. */
function* chain(error: unknown, depth = 0): Generator<Error> {
  if (!(error instanceof Error) || depth > 5) return;
  yield error;
  if (error instanceof AggregateError) for (const one of error.errors) yield* chain(one, depth + 1);
  yield* chain(error.cause, depth + 1);
}

/** Connection exceptions, a server that shuts down, crashed or starts, a session ended by the server (PostgreSQL, appendix A). */
const LOST_STATE = /^(08...|57P0[1-5]|25P03)$/;
/** The server has no means left (connections, memory, disk) or the statement ran into its limit of time or of waiting. */
const STRAINED_STATE = /^(53...|57014|55P03)$/;
const LOST_SOCKET = new Set(["ECONNREFUSED", "ECONNRESET", "ECONNABORTED", "EPIPE", "ETIMEDOUT", "EHOSTUNREACH", "ENETUNREACH", "ENOTFOUND", "EAI_AGAIN"]);
/** Whole sentences of the driver, which gives these no code. Never looked for inside a message: a failed query carries typed text in it. */
const LOST_WORDS = new Set([
  "Connection terminated", "Connection terminated unexpectedly", "Connection terminated due to connection timeout", "timeout expired", "timeout exceeded when trying to connect",
  "Client has encountered a connection error and is not queryable", "Client was closed and is not queryable", "Cannot use a pool after calling end on the pool",
]);

function isLost(error: Error): boolean {
  const { code, syscall } = error as { code?: unknown; syscall?: unknown };
  return LOST_STATE.test(stateOf(error) ?? "") || (typeof code === "string" && LOST_SOCKET.has(code)) || syscall === "connect" || LOST_WORDS.has(error.message);
}

/** The connection is gone, or was never made. */
export function isConnectionLost(error: unknown): boolean {
  for (const e of chain(error)) if (isLost(e)) return true;
  return false;
}

/** The database cannot serve just now: away, starting, full, or too busy to finish within its limits. Trying again later is right. */
export function isOutage(error: unknown): boolean {
  for (const e of chain(error)) if (isLost(e) || STRAINED_STATE.test(stateOf(e) ?? "")) return true;
  return false;
}

/**
 * "nothing": the transaction never came to its COMMIT, so nothing was written. "unknown": it did, and no answer came; the same
 * request sent again under its key finds out.
 */
export type Outcome = "nothing" | "unknown";

/** What leaves the doors of the database when it cannot serve. The framework hands `digest` on to the page that tells of it. */
export class RecordsAway extends Error {
  override readonly name = "RecordsAway";
  readonly digest = "RECORDS_AWAY";
  constructor(readonly outcome: Outcome, cause: unknown) {
    super(outcome === "unknown" ? "the database went away after COMMIT was sent" : "the database cannot serve just now", { cause });
  }
}

/** Whether an error means "try again", and what is known of the write; null for any other error. */
export function awayOf(error: unknown): Outcome | null {
  for (const e of chain(error)) if (e instanceof RecordsAway || e.name === "RecordsAway") return (e as RecordsAway).outcome;
  return isOutage(error) ? "nothing" : null;
}
