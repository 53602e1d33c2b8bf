import { instantsOf, localMinute } from "@/modules/kernel/instant";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/**
 * The instant of a wall-clock time someone typed (`YYYY-MM-DDTHH:mm`). `which` answers the question asked when
 * the time exists twice.
 * Refuses `TIME_NOT_READABLE`; `TIME_DOES_NOT_EXIST` (the clocks were put forward over it) with its neighbours;
 * `TIME_EXISTS_TWICE` (the clocks were put back over it) with both instants.
 * Source: IANA time zone database.
 */
export function typedInstant(local: string, zone: string, which?: "first" | "second"): Result<Date> {
  const m = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2})$/.exec(local);
  const isCalendar =
    m !== null && Number(m[4]) < 24 && Number(m[5]) < 60 && new Date(`${local}:00Z`).toISOString().startsWith(local);
  if (!isCalendar) return refuse("TIME_NOT_READABLE", "Type a date and a time, like 2026-03-08 and 08:10.", { field: "at" });
  const found = instantsOf(local, zone);
  const [first, second] = found;
  if (first === undefined) {
    const [before, after] = neighbours(local, zone);
    return refuse("TIME_DOES_NOT_EXIST", `The clocks were put forward: after ${before} comes ${after}. Type one of these or another time.`, {
      field: "at", data: { before, after },
    });
  }
  if (second === undefined || which === "first") return ok(first);
  if (which === "second") return ok(second);
  return refuse("TIME_EXISTS_TWICE", `The clocks were put back, so ${local.slice(11)} came twice. Say which: the first or the second.`, {
    field: "at", data: { first: first.toISOString(), second: second.toISOString() },
  });
}

/** Last minute before and first minute after the hole, as `HH:mm`. */
function neighbours(local: string, zone: string): [string, string] {
  const asUtc = new Date(`${local}:00Z`).getTime();
  const shifted = (minutes: number) => new Date(asUtc + minutes * 60_000).toISOString().slice(0, 16);
  let back = -1;
  while (back > -240 && instantsOf(shifted(back), zone).length === 0) back -= 1;
  const last = instantsOf(shifted(back), zone)[0];
  const next = last ? localMinute(new Date(last.getTime() + 60_000), zone) : shifted(1);
  return [shifted(back).slice(11), next.slice(11)];
}
