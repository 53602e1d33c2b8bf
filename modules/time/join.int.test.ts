import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { behindTheCurtain } from "@/tests/support/database";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { addPerson, changePerson } from "./commands/people";
import { acceptInvitation } from "./commands/join";
import { invitationFor, openInvitation } from "./identity/invitation";
import { getPerson } from "./queries/settings-lists";

let a: TestShop;
let b: TestShop;
beforeAll(async () => { a = await testShop("first"); b = await testShop("second"); });

const NOW = () => new Date().toISOString();
const invite = async (shop: TestShop, email: string) => {
  const owner = shop.as("owner", NOW());
  const { id } = must(await addPerson(owner, { name: "Nia Novak", shortName: `N${Math.floor(Math.random() * 1e6)}`, roles: ["technician"], email }));
  const person = await getPerson(owner, id);
  return { id, person, token: invitationFor(owner, person).address.split("/join/")[1] ?? "" };
};
const take = async (shop: TestShop, token: string, password: string) => acceptInvitation(shop.system(NOW()), { token, password });
const code = (r: { ok: boolean }) => (r as { refusal?: { code: string } }).refusal?.code ?? "ok";

describe("an invitation", () => {
  it("sets a password once, and is the owner's to make", async () => {
    const { id, person, token } = await invite(a, "nia@first.example");
    expect(() => invitationFor(a.as("mgr", NOW()), person)).toThrow(NotFound);
    expect(await take(a, token, "short")).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "password" }] } });
    expect(code(await take(a, token, "Nia Novak First Headworks"))).toBe("PASSWORD_WEAK");
    const both = await Promise.all([take(a, token, "grey otters swim at dawn"), take(a, token, "grey otters swim at dawn")]);
    expect(both.map(code).filter((c) => c === "ok")).toHaveLength(1);
    expect(await openInvitation(token)).toBeNull();
    expect((await getPerson(a.as("owner", NOW()), id)).hasSignIn).toBe(true);
    expect(await behindTheCurtain("select count(*) from audit_log where detail::text ~ 'otters'")).toEqual(["0"]);
  });

  it("ends with three days, with a change of the person, and cannot be altered or moved to another shop", async () => {
    const { id, person, token } = await invite(a, "nia2@first.example");
    const old = invitationFor({ ...a.as("owner"), now: new Date(Date.now() - 73 * 3_600_000) }, person).address.split("/join/")[1] ?? "";
    expect(await openInvitation(old)).toBeNull();
    expect(await openInvitation(token.replace(id, b.people.tech ?? ""))).toBeNull();
    expect(code(await take(b, token, "grey otters swim at dawn"))).toBe("INVITATION_OVER");
    expect(await openInvitation(token)).not.toBeNull();
    must(await changePerson(a.as("owner", NOW()), { id, version: 1, name: "Nia Novak", shortName: "Nia2", roles: ["technician"], email: "other@first.example" }));
    expect(await openInvitation(token)).toBeNull();
  });

  it("lets somebody known from another shop in only with the password they have", async () => {
    const first = await invite(a, "both@shops.example");
    must(await take(a, first.token, "seven lamps over water"));
    const second = await invite(b, "both@shops.example");
    expect(code(await take(b, second.token, "eight lamps over water"))).toBe("PASSWORD_OTHER");
    must(await take(b, second.token, "seven lamps over water"));
    expect(await behindTheCurtain("select count(*) from users where email = 'both@shops.example'")).toEqual(["1"]);
  });
});
