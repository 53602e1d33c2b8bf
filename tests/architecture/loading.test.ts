import path from "node:path";
import { describe, expect, it } from "vitest";
import { sources } from "./sources";

const LOADING = sources("app", /^loading\.tsx$/).map((f) => path.dirname(f));
const PAGES = sources("app", /^page\.tsx$/);
/** Folders of a page, from app/ down to its own. */
const folders = (page: string): string[] => path.dirname(page).split("/").map((_, i, all) => all.slice(0, i + 1).join("/"));

describe("still shapes while a page is fetched", () => {
  it("are found, over lists", () => {
    expect(LOADING.length).toBeGreaterThan(3);
    for (const list of ["orders", "customers", "parts", "purchases", "flow", "books"]) {
      const page = PAGES.find((p) => p.replace(/\/\([^)]*\)/g, "") === `app/s/[shop]/${list}/page.tsx`) ?? "";
      expect(folders(page).some((f) => LOADING.includes(f)), list).toBe(true);
    }
  });
  // A loading file above a page makes the answer 200 before the page has looked whether its record exists.
  const OF_ONE_RECORD = PAGES.filter((p) => /\[(?!shop\])\w+\]/.test(p) && p.startsWith("app/s/"));
  it("stand over no page of one record, which must be able to answer 404", () => {
    expect(OF_ONE_RECORD.length).toBeGreaterThan(10);
    for (const page of OF_ONE_RECORD) expect(folders(page).filter((f) => LOADING.includes(f)), page).toEqual([]);
  });
});
