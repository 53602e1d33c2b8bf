import { DrizzleQueryError } from "drizzle-orm/errors";
import pg from "pg";
import { describe, expect, it } from "vitest";
import { awayOf, isConnectionLost, isOutage, RecordsAway } from "./outage";

/** As the driver makes it from what the server sends. */
function serverSaid(code: string, message = "words of the server"): pg.DatabaseError {
  return Object.assign(new pg.DatabaseError(message, message.length, "error"), { code, severity: "FATAL" });
}
const socketSaid = (code: string, syscall = "read"): Error => Object.assign(new Error(`${syscall} ${code}`), { code, syscall, errno: -1 });
const wrapped = (cause: Error, query = "select 1", params: unknown[] = []): Error => new DrizzleQueryError(query, params, cause);

// Class 08, 53 and 57 of appendix A, "PostgreSQL Error Codes", of the PostgreSQL 15 manual.
const LOST = ["08000", "08001", "08003", "08004", "08006", "08007", "08P01", "57P01", "57P02", "57P03", "57P05", "25P03"];
const STRAINED = ["53000", "53100", "53200", "53300", "53400", "57014", "55P03"];
const NEITHER = ["23505", "23503", "23P01", "40001", "40P01", "42501", "42P01", "22P02", "57000", "XX000", "25P02"];
/** Sentences of pg and pg-pool that come without a code. */
const SENTENCES = [
  "Connection terminated", "Connection terminated unexpectedly", "Connection terminated due to connection timeout", "timeout expired", "timeout exceeded when trying to connect",
  "Client has encountered a connection error and is not queryable", "Client was closed and is not queryable", "Cannot use a pool after calling end on the pool",
];

describe("an outage", () => {
  it.each(LOST)("%s: the connection is lost", (code) => {
    for (const error of [serverSaid(code), wrapped(serverSaid(code))]) {
      expect(isConnectionLost(error)).toBe(true);
      expect(isOutage(error)).toBe(true);
    }
  });
  it.each(STRAINED)("%s: the connection stands, the server cannot", (code) => {
    for (const error of [serverSaid(code), wrapped(serverSaid(code))]) {
      expect(isConnectionLost(error)).toBe(false);
      expect(isOutage(error)).toBe(true);
    }
  });
  it.each(NEITHER)("%s is none", (code) => {
    expect(isOutage(wrapped(serverSaid(code)))).toBe(false);
  });
  it.each(["ECONNREFUSED", "ECONNRESET", "EPIPE", "ETIMEDOUT", "EHOSTUNREACH", "ENOTFOUND", "EAI_AGAIN"])("%s of a socket", (code) => {
    expect(isConnectionLost(socketSaid(code))).toBe(true);
    expect(isConnectionLost(wrapped(socketSaid(code)))).toBe(true);
  });
  it("a socket file that is not there, but not a file that is not there", () => {
    expect(isConnectionLost(socketSaid("ENOENT", "connect"))).toBe(true);
    expect(isConnectionLost(socketSaid("ENOENT", "open"))).toBe(false);
  });
  it("every try of an address with several", () => {
    expect(isConnectionLost(new AggregateError([socketSaid("ECONNREFUSED", "connect"), socketSaid("ECONNREFUSED", "connect")]))).toBe(true);
    expect(isConnectionLost(new AggregateError([new TypeError("no")]))).toBe(false);
  });
  it.each(SENTENCES)("the driver's %j", (sentence) => {
    expect(isConnectionLost(new Error(sentence))).toBe(true);
    expect(isConnectionLost(wrapped(new Error(sentence), "rollback"))).toBe(true);
  });
  it("is not read out of what somebody typed into a query that failed", () => {
    const typed = [...SENTENCES, "ECONNRESET", "57P01"].join(" ");
    expect(isOutage(wrapped(serverSaid("23505"), "insert into customers", [typed]))).toBe(false);
    expect(isOutage(new Error(`no customer is called ${typed}`))).toBe(false);
  });
  it("is not any fault, nor a thing that is no error, nor a circle", () => {
    const circle = new Error("round");
    circle.cause = circle;
    for (const it of [new TypeError("x is not a function"), circle, "Connection terminated", null, undefined, { code: "57P01" }]) expect(isOutage(it)).toBe(false);
  });
});

describe("what is known of the write", () => {
  it("is what the door of the database said, through any wrapping", () => {
    const lost = new RecordsAway("unknown", serverSaid("57P01"));
    expect(awayOf(lost)).toBe("unknown");
    expect(awayOf(new Error("outer", { cause: lost }))).toBe("unknown");
    expect(awayOf(new RecordsAway("nothing", socketSaid("ECONNREFUSED")))).toBe("nothing");
  });
  it("is nothing for a bare outage, and null for anything else", () => {
    expect(awayOf(socketSaid("ECONNREFUSED", "connect"))).toBe("nothing");
    expect(awayOf(serverSaid("23505"))).toBeNull();
    expect(awayOf(new TypeError("x"))).toBeNull();
  });
});
