import { describe, expect, it } from "vitest";
import { breaches } from "@/db/invariants";
import { acceptInvitation } from "@/modules/time/commands/join";
import { invitationContext } from "@/modules/time/identity/invitation";
import { foundWithOwner, ownersLink } from "@/scripts/found/found";
import { behindTheCurtain, currentDatabase } from "@/tests/support/database";

const NOW = new Date();
const SHOP = { slug: "birchline", name: "Birchline Heads", zone: "Europe/London", currency: "GBP", locale: "en-GB", owner: "Nell Arden", email: "Nell@Birchline.example" };
const found = (more: object = {}) => foundWithOwner(currentDatabase().ownerUrl, "pepper", { ...SHOP, ...more }, NOW);
const tokenOf = (address: string) => decodeURIComponent(address.split("/join/")[1] ?? "");

describe("founding a shop", () => {
  it("makes a shop whose owner has no password, and a link to set one, once", async () => {
    const { slug, address, until } = await found();
    expect(slug).toBe("birchline");
    expect(new Date(until).getTime() - NOW.getTime()).toBe(72 * 3_600_000);
    expect(await behindTheCurtain("select count(*) from users")).toEqual(["0"]);
    expect(await behindTheCurtain("select name || ' ' || roles::text || ' ' || email from people")).toEqual(["Nell Arden {owner} nell@birchline.example"]);
    expect(await behindTheCurtain("select (count(*) > 30)::text from accounts")).toEqual(["true"]);

    const token = tokenOf(address);
    const ctx = await invitationContext(token);
    if (!ctx) throw new Error("the link leads nowhere");
    expect(await acceptInvitation(ctx, { token, password: "too short" })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT" } });
    expect(await acceptInvitation(ctx, { token, password: "seven lamps over water" })).toMatchObject({ ok: true, value: { slug: "birchline" } });
    expect(await invitationContext(token)).toBeNull();
    expect(await acceptInvitation(ctx, { token, password: "eight lamps over water" })).toMatchObject({ ok: false, refusal: { code: "INVITATION_OVER" } });
    expect(await behindTheCurtain("select email from users")).toEqual(["nell@birchline.example"]);
  });
  it("gives another link only while the owner has no password", async () => {
    await found({ slug: "second-try", email: "owner@second.example" });
    expect((await ownersLink(currentDatabase().ownerUrl, "second-try", NOW)).address).toMatch(/\/join\//);
    await expect(ownersLink(currentDatabase().ownerUrl, "birchline", NOW)).rejects.toThrow(/has set a password already/);
    await expect(ownersLink(currentDatabase().ownerUrl, "nowhere", NOW)).rejects.toThrow(/no shop "nowhere"/);
  });
  it.each([
    [{ slug: "birchline" }, /already/], [{ slug: "Bad Slug" }, /--slug/], [{ slug: "x1y", zone: "Mars/Olympus" }, /--zone/], [{ slug: "x1y", currency: "ZZZ" }, /--currency/],
    [{ slug: "x1y", email: "nobody" }, /e-mail/], [{ slug: "x1y", locale: "not a locale" }, /--locale/],
  ])("refuses %o in words, and founds nothing", async (more, words) => {
    const before = await behindTheCurtain("select count(*) from shops");
    await expect(found(more)).rejects.toThrow(words);
    expect(await behindTheCurtain("select count(*) from shops")).toEqual(before);
  });
  it("leaves every invariant standing", async () => {
    const { default: pg } = await import("pg");
    const all = new pg.Client({ connectionString: currentDatabase().superuserUrl });
    await all.connect();
    expect(await breaches(all)).toEqual([]);
    await all.end();
  });
});
