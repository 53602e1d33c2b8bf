import { beforeAll, describe, expect, it } from "vitest";
import { deviceContext } from "@/modules/access/device";
import { NotFound } from "@/modules/access/context";
import { findCustomers } from "@/modules/customers/queries";
import { behindTheCurtain } from "@/tests/support/database";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { enrolledTablet, type Tablet } from "@/tests/support/tablet";
import { addDevice, freshEnrolCode, makeEnrolCode, revokeDevice } from "./commands/devices";
import { doorIn, doorOut, mealIn, mealOut } from "./commands/door";
import { startIndirect } from "./commands/indirect";
import { sayWhenLeft } from "./commands/missing-out";
import { enrolTablet } from "./identity/enrol";
import { identify } from "./identity/identify";
import { sealingKey } from "./identity/seal";
import { sealProof } from "./tablet/seal-proof";

let a: TestShop;
let b: TestShop;
let tablet: Tablet;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  tablet = await enrolledTablet(a);
});

const code = (r: { ok: boolean }) => (r as { refusal?: { code: string } }).refusal?.code ?? "ok";
const id = (who: string) => a.people[who] ?? "";
const entries = (who: string, clock = "door") => behindTheCurtain(
  `select to_char(started_at at time zone 'UTC','MM-DD HH24:MI:SS') || '>' || coalesce(to_char(ended_at at time zone 'UTC','MM-DD HH24:MI:SS'), '') from time_entries where person_id = '${id(who)}' and clock = '${clock}' and voided_at is null order by started_at`);

describe("enrolling a tablet", () => {
  it("works once, within ten minutes, and says nothing of why not", async () => {
    const mgr = { ...a.as("mgr"), now: new Date() };
    const { id: device } = must(await addDevice(mgr, { name: "Bench 9" }));
    const typed = freshEnrolCode();
    must(await makeEnrolCode({ ...mgr, now: new Date(Date.now() - 11 * 60_000) }, { id: device, code: typed }));
    expect(code(await enrolTablet(typed, { ip: "x", agent: "" }))).toBe("CODE_OVER");
    must(await makeEnrolCode(mgr, { id: device, code: typed }));
    const tries = await Promise.all([enrolTablet(typed, { ip: "y", agent: "" }), enrolTablet(typed, { ip: "z", agent: "" })]);
    expect(tries.map(code).sort()).toEqual(["CODE_OVER", "ok"]);
    expect(code(await makeEnrolCode(mgr, { id: device, code: freshEnrolCode() }))).toBe("ENROLLED");
    const stored = await behindTheCurtain(`select length(token_hash) || ':' || coalesce(enrol_code_hash, 'none') from devices where id = '${device}'`);
    expect(stored).toEqual(["64:none"]);
    expect(await behindTheCurtain(`select count(*) from audit_log where detail::text like '%${typed}%'`)).toEqual(["0"]);
  });

  it("is the manager's, gives clock rights of one shop, and ends at once", async () => {
    await expect(addDevice(a.as("tech"), { name: "Mine" })).rejects.toThrow(NotFound);
    expect(await deviceContext(tablet.token, b.shop.slug)).toBeNull();
    const at = await tablet.at("2026-03-02T15:00:00Z");
    await expect(findCustomers(at, { q: "", limit: 5 })).rejects.toThrow(NotFound);
    await expect(addDevice(at, { name: "Another" })).rejects.toThrow(NotFound);
    const other = await enrolledTablet(a, "Bench 3");
    must(await revokeDevice(a.as("mgr"), { id: other.id }));
    expect(await deviceContext(other.token)).toBeNull();
    expect(code(await revokeDevice(b.as("mgr"), { id: tablet.id }))).toBe("NOT_FOUND");
    expect(await deviceContext(tablet.token)).not.toBeNull();
  });
});

describe("who is at the tablet", () => {
  it("needs proof for each act, of a person of this shop, on this tablet, and not for long", async () => {
    const at = await tablet.at("2026-03-02T15:00:00Z");
    expect(code(await doorIn(at, {}))).toBe("PROOF_NEEDED");
    expect(code(await identify(at, { kind: "badge", badge: "B-99" }))).toBe("BADGE_UNKNOWN");
    const { proof } = await tablet.pass("tech", "B-03", "2026-03-02T15:00:00Z");
    expect(code(await doorIn(at, { proof: { ...proof, personId: id("owner") } }))).toBe("PROOF_OVER");
    expect(code(await doorIn(await tablet.at("2026-03-02T15:04:00Z"), { proof }))).toBe("PROOF_OVER");
    const elsewhere = await enrolledTablet(a, "Bench 4");
    expect(code(await doorIn(await elsewhere.at("2026-03-02T15:00:30Z"), { proof }))).toBe("PROOF_OVER");
    const foreign = await identify(at, { kind: "pin", personId: b.people.tech ?? "", pin: "480133" });
    expect(code(foreign)).toBe("PIN_NONE");
    expect(must(await doorIn(await tablet.at("2026-03-02T15:00:30Z"), { proof }))).toMatchObject({ personName: "tech", doubt: null });
  });

  it("keeps the tablet and the person in the audit trail, and neither badge nor pass", async () => {
    const rows = await behindTheCurtain(`select actor_name || ' for ' || (detail->'value'->>'personName') || ' ' || (detail->'input' ? 'proof')::text from audit_log where command = 'time.doorIn' and shop_id = '${a.shop.id}'`);
    expect(rows).toEqual(["Bench 2 for tech false"]);
  });

  it("waits after five wrong PINs, longer each time, and gives the PIN up after ten", async () => {
    let clock = Date.parse("2026-03-02T15:00:00Z");
    const tryPin = async (pin: string) => identify(await tablet.at(new Date(clock).toISOString()), { kind: "pin", personId: id("insp"), pin });
    expect((await tryPin("480135")).ok).toBe(true);
    const said: string[] = [];
    for (let i = 0; i < 5; i++) said.push(code(await tryPin("111222")));
    expect(said).toEqual(["PIN_WRONG", "PIN_WRONG", "PIN_WRONG", "PIN_WRONG", "PIN_WAIT"]);
    expect(await tryPin("480135")).toMatchObject({ ok: false, refusal: { code: "PIN_WAIT", data: { seconds: 30 } } });
    for (const wait of [30, 60, 120, 240]) {
      clock += wait * 1000;
      expect(await tryPin("111222")).toMatchObject({ ok: false, refusal: { code: "PIN_WAIT", data: { seconds: wait * 2 } } });
    }
    clock += 480_000;
    expect(code(await tryPin("111222"))).toBe("PIN_DEAD");
    clock += 86_400_000;
    expect(code(await tryPin("480135"))).toBe("PIN_DEAD");
    expect(await behindTheCurtain(`select pin_failed_tries from people where id = '${id("insp")}'`)).toEqual(["10"]);
  });

  it("takes no more than sixty wrong tries an hour from one tablet", async () => {
    const other = await enrolledTablet(a, "Bench 5");
    const at = await other.at("2026-03-02T15:00:00Z");
    const said: string[] = [];
    for (let i = 0; i < 61; i++) said.push(code(await identify(at, { kind: "badge", badge: `X-${i}` })));
    expect(said.slice(0, 60).every((c) => c === "BADGE_UNKNOWN")).toBe(true);
    expect(said[60]).toBe("TABLET_WAITS");
    expect(code(await identify(at, { kind: "badge", badge: "B-03" }))).toBe("TABLET_WAITS");
  });
});

describe("the door clock", () => {
  it("goes in, to a meal and back, and out; out stops the bench", async () => {
    const day = async (t: string) => [await tablet.at(`2026-03-03T${t}Z`), await tablet.pass("rcv", "B-06", `2026-03-03T${t}Z`)] as const;
    must(await doorIn(...(await day("14:58:00"))));
    expect(code(await doorIn(...(await day("14:59:00"))))).toBe("ALREADY_IN");
    must(await mealOut(...(await day("19:00:10"))));
    const [ctx, proof] = await day("19:30:40");
    must(await mealIn(ctx, proof));
    must(await startIndirect(ctx, { ...proof, work: "clean-up" }));
    must(await doorOut(...(await day("23:01:00"))));
    expect(await entries("rcv")).toEqual(["03-03 14:58:00>03-03 19:00:10", "03-03 19:30:40>03-03 23:01:00"]);
    expect(await entries("rcv", "bench")).toEqual(["03-03 19:30:40>03-03 23:01:00"]);
  });

  it("takes an out without an in and flags it", async () => {
    const r = must(await doorOut(await tablet.at("2026-03-03T23:00:00Z"), await tablet.pass("book", "B-07", "2026-03-03T23:00:00Z")));
    expect(r.flags).toEqual(["in missing"]);
    expect(await entries("book")).toEqual([]);
  });

  it("asks when somebody left on an earlier day, and refuses a time the clocks jumped over", async () => {
    must(await doorIn(await tablet.at("2026-03-07T15:00:00Z"), await tablet.pass("counter", "B-02", "2026-03-07T15:00:00Z")));
    const next = "2026-03-09T14:00:00Z";
    const own = must(await identify(await tablet.at(next), { kind: "badge", badge: "B-02" }));
    expect(own.missingOut).toEqual({ since: "2026-03-07T15:00:00.000Z", lastSeen: "2026-03-07T15:00:00.000Z" });
    const proof = { proof: { kind: "pass" as const, personId: own.personId, pass: own.pass } };
    const said = async (leftAt: string) => sayWhenLeft(await tablet.at(next), { ...proof, leftAt });
    expect(await said("2026-03-08T02:30")).toMatchObject({ ok: false, refusal: { code: "TIME_DOES_NOT_EXIST", data: { before: "01:59", after: "03:00" } } });
    expect(code(await said("2026-03-07T07:00"))).toBe("OUT_BEFORE_IN");
    expect(must(await said("2026-03-07T16:30")).flags).toContain("out typed later");
    expect(await entries("counter")).toEqual(["03-07 15:00:00>03-07 23:30:00"]);
  });
});

describe("what was kept on a tablet without a link", () => {
  const sealed = async (who: string, secret: { pin: string } | { badge: string }, deviceAt: string, offsetMs = 0) => {
    const actId = requestId();
    return { proof: { kind: "sealed" as const, personId: id(who), box: await sealProof(sealingKey(), { actId, ...secret }) }, actId, deviceAt, offsetMs, counter: 1 };
  };

  it("arrives later with its own time, by PIN or badge, and a repeat of it is dropped", async () => {
    const online = await tablet.at("2026-03-04T20:00:00Z");
    const came = await sealed("mgr", { pin: "480138" }, "2026-03-04T14:00:07Z");
    const key = requestId();
    expect(must(await doorIn(online, came, { requestId: key }))).toMatchObject({ at: "2026-03-04T14:00:07.000Z", doubt: null });
    must(await doorIn(online, came, { requestId: key }));
    // The tablet is an hour slow; the offset it measured puts that right and is flagged.
    const went = await sealed("mgr", { badge: "B-08" }, "2026-03-04T18:00:00Z", 3_600_000);
    expect(must(await doorOut(online, went)).flags).toEqual(["tablet clock off"]);
    expect(await entries("mgr")).toEqual(["03-04 14:00:07>03-04 19:00:00"]);
    expect(await behindTheCurtain(`select source || ' ' || (device_at is not null)::text from punches where person_id = '${id("mgr")}' order by at`)).toEqual(["offline true", "offline true"]);
  });

  it("is kept to be checked, never dropped, when the proof or a rule speaks against it", async () => {
    const online = await tablet.at("2026-03-05T20:00:00Z");
    expect(must(await doorIn(online, await sealed("owner", { pin: "999999" }, "2026-03-05T14:00:00Z"))).doubt).toMatch(/did not match/);
    must(await doorIn(online, await sealed("owner", { pin: "480131" }, "2026-03-05T14:10:00Z")));
    expect(must(await doorIn(online, await sealed("owner", { pin: "480131" }, "2026-03-05T14:20:00Z"))).doubt).toMatch(/already in/);
    must(await doorOut(online, await sealed("owner", { pin: "480131" }, "2026-03-05T19:00:00Z")));
    expect(must(await doorIn(online, await sealed("owner", { pin: "480131" }, "2026-03-05T13:00:00Z"))).doubt).toMatch(/before times/);
    expect(await entries("owner")).toEqual(["03-05 14:10:00>03-05 19:00:00"]);
    expect(await behindTheCurtain(`select count(*) filter (where flag like 'to be checked%') || ' of ' || count(*) from punches where person_id = '${id("owner")}'`)).toEqual(["3 of 5"]);
  });

  it("counts a wrong sealed PIN even when it is sent live", async () => {
    const live = await tablet.at("2026-03-05T21:00:00Z");
    const tries = () => behindTheCurtain(`select pin_failed_tries from people where id = '${id("rcv")}'`);
    expect(await tries()).toEqual(["0"]);
    expect(must(await doorIn(live, await sealed("rcv", { pin: "999999" }, "2026-03-05T21:00:00Z"))).doubt).toMatch(/did not match/);
    expect(await tries()).toEqual(["1"]);
  });

  it("does not let a sealed proof serve a second act", async () => {
    const online = await tablet.at("2026-03-06T20:00:00Z");
    const first = await sealed("owner", { pin: "480131" }, "2026-03-06T14:00:00Z");
    must(await doorIn(online, first));
    expect(must(await doorOut(online, { ...first, actId: requestId(), deviceAt: "2026-03-06T15:00:00Z" })).doubt).toMatch(/did not match/);
  });

  it("is taken from a tablet put out of use, to be checked, and nothing else is", async () => {
    const other = await enrolledTablet(a, "Bench 6");
    const before = await other.pass("lead", "B-04", "2026-03-04T14:00:00Z");
    must(await revokeDevice(a.as("mgr"), { id: other.id }));
    await expect(other.at("2026-03-04T14:01:00Z")).rejects.toThrow();
    const still = await other.at("2026-03-04T18:00:00Z", { revokedToo: true });
    expect(must(await doorIn(still, { ...before, deviceAt: "2026-03-04T14:01:00Z", offsetMs: 0 })).doubt).toMatch(/put out of use/);
    await expect(identify(still, { kind: "badge", badge: "B-04" })).rejects.toThrow(NotFound);
    expect(await entries("lead")).toEqual([]);
    expect(await behindTheCurtain(`select flag from punches where person_id = '${id("lead")}'`)).toEqual(["to be checked"]);
  });
});
