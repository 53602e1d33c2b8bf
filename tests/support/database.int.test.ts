import pg from "pg";
import { afterAll, describe, expect, it } from "vitest";
import { behindTheCurtain, currentDatabase, testDatabase } from "./database";

const open: pg.Client[] = [];
async function connect(url: string): Promise<pg.Client> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  open.push(client);
  return client;
}
afterAll(async () => {
  await Promise.all(open.map((client) => client.end()));
});

describe("the database of a test file", () => {
  it("is migrated, empty, and opened by roles that can't step over row security", async () => {
    for (const [url, role] of [[currentDatabase().appUrl, "vk_app"], [currentDatabase().jobUrl, "vk_job"]] as const) {
      const client = await connect(url);
      const { rows } = await client.query("select current_user as role, rolsuper or rolbypassrls as free from pg_roles where rolname = current_user");
      expect(rows).toEqual([{ role, free: false }]);
      expect((await client.query("select count(*)::int as n from people")).rows).toEqual([{ n: 0 }]);
    }
    expect(process.env.VK_DATABASE_URL).toBe(currentDatabase().appUrl);
  });
  it("is another one for each call, so that nothing is left over", async () => {
    const first = currentDatabase();
    const second = await testDatabase();
    expect(second.name).not.toBe(first.name);
    expect(process.env.VK_DATABASE_URL).toBe(second.appUrl);
    expect(await behindTheCurtain("select current_database();")).toEqual([second.name]);
  });
});
